import { conventionTex, conventionText, noteHtml } from "./convention.ts";
import { doublesNote, forgetDoubles } from "./doubles.ts";
import { plainText } from "./plain.ts";
import { isPlainNumber } from "./plain-number.ts";
import { conventionsOf, kindOf, partsOf, show } from "./show.ts";
import { display, small, texWords } from "./tex.ts";

/** Representations of one thing by MIME type: strings, or unpacked JSON under types that end in +json. */
export interface MimeBundle {
  readonly "text/plain": string;
  readonly [mime: string]: unknown;
}

export const VALUE_TYPE = "application/vnd.halfperiod.value+json";

/**
 * What a page needs to show a value: text always; a formula, a table or a picture where there is one; and the value as
 * data. undefined has no bundle.
 *
 * Plain JavaScript values give bounded text; none of their getters is run and none of their methods called.
 * Never throws: a value that fails to show itself is shown by its class, with what failed.
 */
export function bundle(value: unknown): MimeBundle | undefined {
  if (value === undefined) return undefined;
  try {
    return whole(value);
  } catch (error) {
    return { "text/plain": `${plainText(value)}\n(it could not be shown better: ${reason(error)})` };
  }
}

function whole(value: unknown): MimeBundle {
  const rows = conventionsOf(value);
  forgetDoubles();
  const text = show.text(value);
  const doubles = doublesNote();
  const under = doubles === undefined ? [] : [doubles];
  const out: Record<string, unknown> & { "text/plain": string } = {
    "text/plain": [withNote(text, doubles), ...conventionText(rows)].join("\n"),
  };
  const kind = kindOf(value);
  const svg = kind?.svg?.(value);
  if (svg !== undefined) out["image/svg+xml"] = svg;
  const html = kind?.html?.(value, show);
  if (html !== undefined) out["text/html"] = html + noteHtml(under);
  const latex = latexOf(value, [...under.map((line) => small(texWords(line))), ...conventionTex(rows)]);
  if (latex !== undefined) out["text/latex"] = latex;
  if (kind || isNumber(value) || partsOf(value)) out[VALUE_TYPE] = show.data(value);
  return out;
}

/** Behind a text of one line, under a longer one. */
function withNote(text: string, note: string | undefined): string {
  if (note === undefined) return text;
  return text.includes("\n") ? `${text}\n${note}` : `${text}   (${note})`;
}

function latexOf(value: unknown, notes: readonly string[]): string | undefined {
  const kind = kindOf(value);
  if (kind?.prose) return kind.prose(value, show);
  const typeset = kind ? kind.tex !== undefined : isPlainNumber(value) || partsOf(value) !== undefined;
  if (!typeset) return undefined;
  return display(show.tex(value), ...notes);
}

function isNumber(value: unknown): boolean {
  return typeof value === "bigint" || typeof value === "number";
}

function reason(error: unknown): string {
  try {
    return error instanceof Error ? `${error.name}: ${error.message}` : String(error);
  } catch {
    return "an error that cannot be read";
  }
}
