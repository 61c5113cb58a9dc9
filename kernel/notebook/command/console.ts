// What the notebook commands share: where they write, how they read their arguments, how they say that something is off.
import { parseArgs } from "node:util";
import type { Notebook } from "../format.ts";
import { plainText } from "../page/terminal.ts";
import type { Screen } from "../progress.ts";
import type { CellReport } from "../run.ts";
import { changesSince, isEdited, readStamp } from "../stamp.ts";

export interface Console {
  /** Results. */
  readonly out: Screen;
  /** Progress and complaints. */
  readonly err: Screen;
}

/** Exit codes: done, a notebook does not do what it should, the request itself cannot be carried out. */
export const EXIT = { ok: 0, failed: 1, usage: 2, interrupted: 130 } as const;

/** Arguments that make no sense, with the line that would. */
export class UsageError extends Error {
  constructor(problem: string, usage: string) {
    super(`${problem}\nusage: halfperiod ${usage}`);
    this.name = "UsageError";
  }
}

export interface Arguments {
  readonly values: Readonly<Record<string, string | undefined>>;
  readonly switches: Readonly<Record<string, boolean | undefined>>;
  readonly positionals: readonly string[];
}

/** Reads a command's arguments: options that take a value, and switches. An unknown one is an error with the usage. */
export function readArguments(
  args: readonly string[],
  { values = [], switches = [] }: { readonly values?: readonly string[]; readonly switches?: readonly string[] },
  usage: string,
): Arguments {
  const options = Object.fromEntries([
    ...values.map((name) => [name, { type: "string" as const }]),
    ...switches.map((name) => [name, { type: "boolean" as const }]),
  ]);
  try {
    const parsed = parseArgs({ args: [...args], options, allowPositionals: true, strict: true });
    const entries = Object.entries(parsed.values);
    return {
      values: Object.fromEntries(entries.filter((entry): entry is [string, string] => typeof entry[1] === "string")),
      switches: Object.fromEntries(entries.filter((entry): entry is [string, boolean] => entry[1] === true)),
      positionals: parsed.positionals,
    };
  } catch (error) {
    const problem = error instanceof Error ? (error.message.split(". ")[0] ?? error.message) : String(error);
    throw new UsageError(problem, usage);
  }
}

/** Seconds of an option as milliseconds. */
export function readLimit(text: string | undefined, usage: string): number | undefined {
  if (text === undefined) return undefined;
  const limit = Number(text);
  if (!(limit > 0 && limit <= 86_400)) throw new UsageError(`--limit ${text}; expected seconds, such as 600`, usage);
  return limit * 1000;
}

/** Proved digits of an option. */
export function readDigits(text: string | undefined, usage: string): number | undefined {
  if (text === undefined) return undefined;
  if (!/^[1-9]\d{0,5}$/.test(text)) throw new UsageError(`--digits ${text}; expected a count, such as 80`, usage);
  return Number(text);
}

/** Says, without running anything, that the code is another than that of the stored run. */
export function tellEdits(notebook: Notebook, err: Screen): void {
  const stamp = readStamp(notebook);
  const edits = stamp && isEdited(stamp, notebook) ? changesSince(stamp, notebook).slice(0, 1) : [];
  for (const edit of edits) err.write(`halfperiod: ${edit}; halfperiod run makes the results anew\n`);
}

/** The cell that stopped a run, with its error, as a person reads it in a terminal. */
export function failedCell(name: string, total: number, { position, status, source, error }: CellReport): string {
  const code = source.split("\n").map((line, index) => `  ${String(index + 1).padStart(3)}  ${line}`);
  const trace = error ? plainText(error.traceback.join("\n") || `${error.ename}: ${error.evalue}`) : "";
  return `${name}: cell ${position} of ${total}: ${status}\n\n${code.join("\n")}\n\n${indent(trace)}\n`;
}

function indent(text: string): string {
  return text.replace(/^(?=.)/gm, "  ");
}
