// Pieces of TeX that every mathematics renderer of the front ends takes, old ones included, and a TeX installation too:
// arrays with plain column letters, no packages, no macros inside \text.

const COMMANDS: Readonly<Record<string, string>> = {
  "\\": "\\backslash ",
  "{": "\\{",
  "}": "\\}",
  $: "\\$",
  "%": "\\%",
  "&": "\\&",
  "#": "\\#",
  _: "\\_",
  "^": "\\wedge ",
  "~": "\\sim ",
  "<": "{<}",
  ">": "{>}",
  "≤": "\\le ",
  "≥": "\\ge ",
  "≠": "\\ne ",
  "≈": "\\approx ",
  "≡": "\\equiv ",
  "∈": "\\in ",
  "→": "\\to ",
  "±": "\\pm ",
  "×": "\\times ",
  "·": "\\cdot ",
  "−": "-",
  "√": "\\surd ",
  "∞": "\\infty ",
  "′": "{}'",
  "²": "{}^2",
  "³": "{}^3",
  "½": "\\tfrac12 ",
  ℘: "\\wp ",
  ℓ: "\\ell ",
  "…": "\\ldots ",
  ...greek(),
};

function greek(): Record<string, string> {
  const names =
    "α alpha β beta γ gamma δ delta ε varepsilon ζ zeta η eta θ theta κ kappa λ lambda μ mu ν nu ξ xi π pi ρ rho σ sigma τ tau φ varphi χ chi ψ psi ω omega Γ Gamma Δ Delta Θ Theta Λ Lambda Ξ Xi Π Pi Σ Sigma Φ Phi Ψ Psi Ω Omega".split(
      " ",
    );
  const map: Record<string, string> = {};
  for (let k = 0; k + 1 < names.length; k += 2) map[names[k]!] = `\\${names[k + 1]} `;
  return map;
}

const SUBSCRIPTS = "₀₁₂₃₄₅₆₇₈₉";

/**
 * Words inside mathematics. Characters with a meaning in TeX leave the \text, since old renderers show a backslash
 * inside it as it stands; Greek letters and signs become commands, so that any TeX engine has them, and digits behind a
 * Greek letter are its index.
 */
export function texWords(words: string): string {
  let out = "";
  let run = "";
  const flush = (): void => {
    if (run !== "") out += `\\text{${run}}`;
    run = "";
  };
  for (const token of words.replace(/[\p{Cc}\s]+/gu, " ").match(/\p{Script=Greek}\d+|./gsu) ?? []) {
    const character = [...token][0] ?? "";
    const subscript = SUBSCRIPTS.indexOf(character);
    const indexed =
      token.length > character.length
        ? `${COMMANDS[character]?.trim() ?? ""}_{${token.slice(character.length)}}`
        : undefined;
    const command = subscript >= 0 ? `_${subscript}` : (indexed ?? COMMANDS[character]);
    if (command === undefined) run += token;
    else {
      flush();
      out += command;
    }
  }
  flush();
  return out.trimEnd();
}

/** Text that may hold $formulas$, as mathematics: the formulas as they stand, the words around them as words. */
export function texProse(text: string): string {
  return splitFormulas(text)
    .map((piece) => (piece.formula ? `{${piece.text}}` : texWords(piece.text)))
    .join("");
}

export interface ProsePiece {
  readonly formula: boolean;
  readonly text: string;
}

/** Splits at $...$; a formula whose braces do not balance stays text. */
export function splitFormulas(text: string): ProsePiece[] {
  const pieces: ProsePiece[] = [];
  const pattern = /\$([^$]+)\$/g;
  let last = 0;
  for (const match of text.matchAll(pattern)) {
    const formula = match[1] ?? "";
    if (!balanced(formula)) continue;
    if (match.index > last) pieces.push({ formula: false, text: text.slice(last, match.index) });
    pieces.push({ formula: true, text: formula });
    last = match.index + match[0].length;
  }
  if (last < text.length) pieces.push({ formula: false, text: text.slice(last) });
  return pieces;
}

function balanced(formula: string): boolean {
  let depth = 0;
  for (const character of formula.replace(/\\[\s\S]/g, "")) {
    if (character === "{") depth++;
    else if (character === "}") depth--;
    if (depth < 0) return false;
  }
  return depth === 0 && !/\\$/.test(formula);
}

/** A name such as "g2", "ω1", "omega_1", "x" or "real period": italic with an index where it is a letter, else words. */
export function texName(name: string): string {
  const match = /^(\p{L}|[a-zA-Z]+?)(?:(\d+)|_\{?(\d+|\p{L})\}?)?(′*)$/u.exec(name);
  const letter = match?.[1] ?? "";
  const command = [...letter].length === 1 ? (COMMANDS[letter]?.trim() ?? letter) : GREEK_WORDS.get(letter);
  if (!match || command === undefined) return texWords(name);
  const low = match[2] ?? match[3];
  const index = low === undefined ? "" : `_{${low}}`;
  return `${command}${index}${"'".repeat(match[4]?.length ?? 0)}`;
}

const GREEK_WORDS: ReadonlyMap<string, string> = new Map(
  Object.values(COMMANDS)
    .filter((command) => /^\\[a-zA-Z]{2,} $/.test(command))
    .map((command): [string, string] => [command.trim().slice(1), command.trim()])
    .filter(
      ([word]) => !/^(le|ge|ne|in|to|pm|backslash|wedge|sim|times|cdot|surd|infty|ldots|approx|equiv)$/.test(word),
    ),
);

export function fraction(num: string, den: string): string {
  return `\\frac{${num}}{${den}}`;
}

/** Rows under each other. `columns` holds one letter l, c or r a column. */
export function array(columns: string, rows: readonly (readonly string[])[]): string {
  const body = rows.map((row) => row.join(" & ")).join(" \\\\ ");
  return `\\begin{array}{${columns}} ${body} \\end{array}`;
}

/** The whole of a text/latex output: one displayed formula. */
export function display(...lines: readonly string[]): string {
  const [first = ""] = lines;
  return `$\\displaystyle ${
    lines.length > 1
      ? array(
          "l",
          lines.map((line) => [`\\displaystyle ${line}`]),
        )
      : first
  }$`;
}

/** Small words under a number. */
export function small(tex: string): string {
  return `{\\scriptstyle ${tex}}`;
}
