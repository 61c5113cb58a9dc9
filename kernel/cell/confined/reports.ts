// What confined cells may say to the kernel. Their words are hostile input: bounded, checked field by field, and of what
// they show only the types that a page of the library has.
import { StringDecoder } from "node:string_decoder";
import type { ChildCommand, ChildReport } from "../messages.ts";
import type { ErrorReport, MimeBundle } from "../port.ts";

export type RunCommand = Extract<ChildCommand, { kind: "run" }>;

/** To the realm, on descriptor 3. */
export type RealmCommand =
  | RunCommand
  | { readonly kind: "digits"; readonly count: number }
  | { readonly kind: "timer"; readonly id: number };

/** From the process of the confined cells: of the reports of any cells those that make sense here, and its own. */
export type ConfinedReport =
  | Extract<ChildReport, { kind: "ready" | "stream" | "display" | "leaving" | "done" }>
  /** The fences do not stand here. */
  | { readonly kind: "refused"; readonly words: string }
  /** A command could not be carried out by the realm. */
  | { readonly kind: "fault" };

const TEXT_TYPES = new Set(["text/plain", "text/latex", "text/html", "image/svg+xml"]);
const VALUE_TYPE = "application/vnd.halfperiod.value+json";
const MOST_NAMES = 10_000;
const LONGEST_NAME = 500;
const LONGEST_WORDS = 20_000;

/** The report in a line; undefined if it is none. Nothing of the line is kept that is not named here. */
export function readReport(line: string): ConfinedReport | undefined {
  let fields: Record<string, unknown>;
  try {
    const value: unknown = JSON.parse(line);
    if (!isRecord(value)) return undefined;
    fields = value;
  } catch {
    return undefined;
  }
  switch (fields.kind) {
    case "ready":
    case "fault":
      return { kind: fields.kind };
    case "refused":
    case "leaving":
      return typeof fields.words === "string" ? { kind: fields.kind, words: words(fields.words) } : undefined;
    case "stream":
      return readStream(fields);
    case "display":
      return readDisplay(fields);
    case "done":
      return readDone(fields);
    default:
      return undefined;
  }
}

function readStream({ cell, name, text }: Record<string, unknown>): ConfinedReport | undefined {
  if (!isCell(cell) || (name !== "stdout" && name !== "stderr") || typeof text !== "string") return undefined;
  return { kind: "stream", cell, name, text };
}

function readDisplay({ cell, data, displayId, update }: Record<string, unknown>): ConfinedReport | undefined {
  const shown = readBundle(data);
  if (!isCell(cell) || !shown) return undefined;
  const named = isName(displayId) ? { displayId } : {};
  return { kind: "display", cell, data: shown, metadata: {}, ...named, ...(update === true && { update }) };
}

function readDone({ cell, defined, error, result }: Record<string, unknown>): ConfinedReport | undefined {
  if (!isCell(cell) || !Array.isArray(defined) || defined.length > MOST_NAMES || !defined.every(isName))
    return undefined;
  const failed = error === undefined ? undefined : readError(error);
  if (error !== undefined && !failed) return undefined;
  const data = isRecord(result) ? readBundle(result.data) : undefined;
  if (result !== undefined && !data) return undefined;
  return {
    kind: "done",
    cell,
    defined,
    ...(failed && { error: failed }),
    ...(data && { result: { data, metadata: {} } }),
  };
}

function readError(error: unknown): ErrorReport | undefined {
  if (!isRecord(error)) return undefined;
  const { ename, evalue, traceback } = error;
  if (typeof ename !== "string" || typeof evalue !== "string" || !Array.isArray(traceback)) return undefined;
  if (traceback.length > 200 || !traceback.every((line) => typeof line === "string")) return undefined;
  return { ename: ename.slice(0, LONGEST_NAME), evalue: words(evalue), traceback: traceback.map(words) };
}

/** What is shown, by its known types; scripts and the like are dropped. */
function readBundle(data: unknown): MimeBundle | undefined {
  if (!isRecord(data)) return undefined;
  const entries = Object.entries(data).filter(([mime, value]) =>
    TEXT_TYPES.has(mime) ? typeof value === "string" : mime === VALUE_TYPE && value !== null,
  );
  return Object.fromEntries(entries);
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}

function isCell(value: unknown): value is number {
  return typeof value === "number" && Number.isSafeInteger(value) && value >= 0;
}

function isName(value: unknown): value is string {
  return typeof value === "string" && value.length <= LONGEST_NAME;
}

function words(text: string): string {
  return text.length > LONGEST_WORDS ? `${text.slice(0, LONGEST_WORDS)}...` : text;
}

/** Cuts a stream into lines and counts: a line, or all since `restart`, may be so long and no longer. */
export class BoundedLines {
  readonly #line: number;
  readonly #all: number;
  readonly #decoder = new StringDecoder("utf8");
  #pieces: string[] = [];
  #pending = 0;
  #total = 0;

  constructor(line: number, all: number) {
    this.#line = line;
    this.#all = all;
  }

  restart(): void {
    this.#total = 0;
  }

  /** The lines that a chunk completes; undefined once a bound is passed. */
  push(chunk: Buffer): string[] | undefined {
    const parts = this.#decoder.write(chunk).split("\n");
    const last = parts.pop() ?? "";
    const lines: string[] = [];
    for (const part of parts) {
      lines.push([...this.#pieces, part].join(""));
      this.#pieces = [];
      this.#pending = 0;
    }
    this.#pieces.push(last);
    this.#pending += last.length;
    this.#total += chunk.length;
    return this.#pending > this.#line || this.#total > this.#all ? undefined : lines;
  }
}
