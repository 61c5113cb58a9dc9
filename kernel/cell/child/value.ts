// The value of a cell as a MIME bundle: by the library's table, or by Node's own printing.
import { inspect } from "node:util";
import type { MimeBundle } from "../port.ts";

export interface Shown {
  readonly data: MimeBundle;
  readonly metadata: MimeBundle;
}

/** What makes bundles of values; undefined: not one of its kinds. */
export type Bundler = (value: unknown) => MimeBundle | undefined;

const LONGEST_TEXT = 100_000;

/** Formats values; a formatter that throws falls back to another text, and says so. */
export function formatter(bundler: Bundler): (value: unknown) => Shown {
  return (value) => {
    try {
      const data = bundler(value);
      if (data) return { data, metadata: {} };
      return { data: { "text/plain": plainText(value) }, metadata: {} };
    } catch (error) {
      return { data: { "text/plain": failedText(value, error) }, metadata: {} };
    }
  };
}

/** Text of a plain JavaScript value. */
export function plainText(value: unknown): string {
  const text = inspect(value, { depth: 4, maxArrayLength: 100, maxStringLength: 10_000, breakLength: 80 });
  return text.length <= LONGEST_TEXT ? text : `${text.slice(0, LONGEST_TEXT)}... (${text.length} characters)`;
}

function failedText(value: unknown, error: unknown): string {
  const reason = error instanceof Error ? error.message : String(error);
  return `a value of type ${typeof value} (showing it failed: ${reason})`;
}
