// Docstrings as HTML: labelled parts as a list, code as code, and the mathematics in them set as far as HTML goes: letters
// in italics, indices and powers in their places. Front ends show it without a mathematics renderer.

const LABELS = "Domain|Branch|Error|Cost|Throws|Source|Method|Accuracy|Value";
/** A label begins a line, or follows the end of a sentence. */
const LABEL = new RegExp(`(?:^|(?<=[.;] ))(${LABELS}) +(?=\\S)`, "gm");

const SPACE = "margin:.25em 0 .25em 1.5em;text-indent:-1.5em";

/** The whole tooltip: the signature, the documentation, its tags. */
export function inspectionHtml(signature: string, documentation: string, tags: readonly string[]): string {
  const examples = tags.map((tag) => {
    const [, name = "", text = ""] = /^@(\w+) ?([\s\S]*)$/.exec(tag) ?? [];
    return name === "example" ? codeBlock(text) : `<p><b>${name}</b> ${sentence(text)}</p>`;
  });
  return [codeBlock(signature), documentationHtml(documentation), ...examples].join("\n");
}

export function codeBlock(code: string): string {
  return `<pre style="white-space:pre-wrap"><code>${escaped(code)}</code></pre>`;
}

/** A docstring as HTML. */
export function documentationHtml(text: string): string {
  // A line that is moved in goes on with the part above it.
  const joined = text.replace(/\n[ \t]+(?=\S)/g, " ");
  return joined
    .split(/\n{2,}/)
    .filter((paragraph) => paragraph.trim() !== "")
    .map(paragraphHtml)
    .join("\n");
}

function paragraphHtml(paragraph: string): string {
  const [intro = "", ...parts] = paragraph.split(LABEL);
  const shown = intro.trim() === "" ? "" : `<p>${sentence(intro.trim())}</p>`;
  const labelled: string[] = [];
  for (let k = 0; k + 1 < parts.length; k += 2) {
    labelled.push(`<div style="${SPACE}"><b>${parts[k]}</b> ${sentence((parts[k + 1] as string).trim())}</div>`);
  }
  return [shown, ...labelled].filter((part) => part !== "").join("\n");
}

/** Running text with code and mathematics. */
function sentence(text: string): string {
  return text
    .split(/(\w*`[^`]*`)/)
    .flatMap((piece, k) => (k % 2 === 1 ? [code(piece)] : words(piece)))
    .join("");
}

function words(text: string): string[] {
  return text.split(/(\s+)/).map((word) => {
    const [, before = "", core = "", after = ""] = /^([([]*)(.*?)([.,;:]*)$/su.exec(word) ?? [];
    // L.wp(z) and qTheta are written so in a cell.
    const isCode = /^[\p{L}_]\w*\.\p{L}[\w.]*(?:\(|$)/u.test(core) || /^[a-z]+[A-Z][a-z]\w*$/.test(core);
    return isCode ? `${before}${code(core)}${after}` : mathematics(escaped(word));
  });
}

/** An entity; a power; a letter with its index; a letter by itself (a and I are words, as is A at the start of a sentence). */
const MATHEMATICS =
  /&\w+;|(?<=[\p{L}\p{Nd})])\^(-?\w+|\([^)]*\))|(?<![\p{L}\p{Nd}_'’#])([A-Za-zΑ-ω℘])(?:_?(\d{1,2})|_([a-z]))(?![\p{L}\p{Nd}])|(?<![\p{L}_'’#])([b-zB-HJ-ZΑ-ω℘])(?![\p{L}\p{Nd}_'’])/gu;

function mathematics(text: string): string {
  return text.replace(MATHEMATICS, (all, power, letter, number, index, alone) => {
    if (power !== undefined) return `<sup>${power}</sup>`;
    if (letter !== undefined) return `<i>${letter}</i><sub>${number ?? index}</sub>`;
    return alone === undefined ? all : `<i>${alone}</i>`;
  });
}

function code(text: string): string {
  const bare = text.startsWith("`") ? text.slice(1, -1) : text;
  return `<code>${escaped(bare)}</code>`;
}

/** Quotation marks stay: the mathematics is read from the escaped text, where an apostrophe tells a word from a letter. */
function escaped(text: string): string {
  return text.replace(/&/g, "&amp;").replace(/</g, "&lt;").replace(/>/g, "&gt;");
}
