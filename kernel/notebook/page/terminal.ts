// What a terminal would show, as plain text: colours dropped, carriage returns and backspaces carried out.

// biome-ignore lint/suspicious/noControlCharactersInRegex: escape sequences begin with a control character
const ESCAPES = /\u001B(?:\[[0-9;?]*[ -/]*[@-~]|\][^\u0007\u001B]*(?:\u0007|\u001B\\)|[@-Z\\-_])/g;

export function plainText(text: string): string {
  const lines = text.replace(ESCAPES, "").replace(/\r\n/g, "\n").split("\n");
  return lines.map(overwrite).join("\n");
}

function overwrite(line: string): string {
  if (!/[\r\b]/.test(line)) return line;
  const shown: string[] = [];
  let column = 0;
  for (const character of line) {
    if (character === "\r") column = 0;
    else if (character === "\b") column = Math.max(0, column - 1);
    else shown[column++] = character;
  }
  return shown.join("");
}
