// Reading the text of a notebook file: JSON, then the shape that nbformat 4 asks for, fault by fault.
import { type Bundle, type Cell, type Notebook, NotebookError, type Output } from "./format.ts";

type Fields = Record<string, unknown>;

const SAVE_AGAIN = "Open it in a notebook front end and save it there, which converts it";

/**
 * The notebook in a file's text.
 *
 * Throws   NotebookError if it is not JSON, not of format 4, or a cell or output lacks what the format asks for; the
 *          message names the place, such as `cells[3].outputs[0]`.
 */
export function parseNotebook(text: string, file: string): Notebook {
  const root = object(parseJson(text, file), (given) => new NotebookError(file, `${given}; expected a notebook`));
  requireFormat(root, file);
  const at = new Reader(file, "notebook");
  const cells = at.list(root, "cells").map((cell, index) => readCell(cell, new Reader(file, `cells[${index}]`)));
  requireUniqueIds(cells, file);
  return {
    ...root,
    nbformat: 4,
    nbformat_minor: at.integer(root, "nbformat_minor"),
    metadata: at.record(root, "metadata"),
    cells,
  };
}

function parseJson(text: string, file: string): unknown {
  const body = text.startsWith("\uFEFF") ? text.slice(1) : text;
  if (body.trim() === "") throw new NotebookError(file, "the file is empty; expected a notebook");
  try {
    return JSON.parse(body);
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    const end = body.trimEnd().length;
    const brokenOff = /end of JSON|Unterminated/.test(reason) || (position(reason) ?? -1) >= end;
    throw new NotebookError(
      file,
      brokenOff ? `the JSON breaks off after ${body.split("\n").length} lines` : `not JSON (${place(body, reason)})`,
      brokenOff ? "The file was cut short; take it from a backup or a checkpoint" : "",
    );
  }
}

function place(text: string, reason: string): string {
  const offset = position(reason);
  if (offset === undefined) return reason;
  const before = text.slice(0, offset).split("\n");
  return `line ${before.length}, column ${(before.at(-1) ?? "").length + 1}`;
}

function position(reason: string): number | undefined {
  const digits = /at position (\d+)/.exec(reason)?.[1];
  return digits === undefined ? undefined : Number(digits);
}

function requireFormat(root: Fields, file: string): void {
  const { nbformat } = root;
  if (nbformat === 4) return;
  if (typeof nbformat !== "number") throw new NotebookError(file, `no "nbformat" number; expected a notebook`);
  const hint = nbformat < 4 ? SAVE_AGAIN : "A newer halfperiod may read it";
  throw new NotebookError(file, `a notebook of format ${nbformat}; expected format 4`, hint);
}

function requireUniqueIds(cells: readonly Cell[], file: string): void {
  const seen = new Set<string>();
  for (const { id } of cells) {
    if (id === undefined) continue;
    if (seen.has(id)) throw new NotebookError(file, `two cells have the id "${id}"`, SAVE_AGAIN);
    seen.add(id);
  }
}

function readCell(value: unknown, at: Reader): Cell {
  const cell = at.object(value);
  const common = { ...cell, metadata: at.record(cell, "metadata"), source: at.text(cell, "source") };
  const kind = cell.cell_type;
  if (kind === "markdown" || kind === "raw") return { ...common, cell_type: kind };
  if (kind !== "code") throw at.fault("cell_type", kind, `"code", "markdown" or "raw"`);
  return {
    ...common,
    cell_type: "code",
    execution_count: at.count(cell),
    outputs: at.list(cell, "outputs").map((output, index) => readOutput(output, at.within(`outputs[${index}]`))),
  };
}

function readOutput(value: unknown, at: Reader): Output {
  const output = at.object(value);
  const kind = output.output_type;
  switch (kind) {
    case "stream":
      return { output_type: kind, name: output.name === "stderr" ? "stderr" : "stdout", text: at.text(output, "text") };
    case "display_data":
      return { output_type: kind, data: at.bundle(output, "data"), metadata: at.record(output, "metadata") };
    case "execute_result":
      return {
        output_type: kind,
        execution_count: at.count(output),
        data: at.bundle(output, "data"),
        metadata: at.record(output, "metadata"),
      };
    case "error":
      return {
        output_type: kind,
        ename: at.text(output, "ename"),
        evalue: at.text(output, "evalue"),
        traceback: at.list(output, "traceback").map(String),
      };
    default:
      throw at.fault("output_type", kind, "stream, display_data, execute_result or error");
  }
}

function object(value: unknown, fault: (given: string) => Error): Fields {
  if (typeof value !== "object" || value === null || Array.isArray(value)) throw fault(describe(value));
  return value as Fields;
}

function describe(value: unknown): string {
  if (value === undefined) return "nothing";
  if (Array.isArray(value)) return "a list";
  if (typeof value === "object" && value !== null) return "an object";
  return JSON.stringify(value).slice(0, 40);
}

/** Is this MIME type's value unpacked JSON in a document, rather than text? */
export function isJsonMime(mime: string): boolean {
  return mime === "application/json" || mime.endsWith("+json");
}

/** Reads the fields of one object and knows where it stands. */
class Reader {
  readonly file: string;
  readonly where: string;

  constructor(file: string, where: string) {
    this.file = file;
    this.where = where;
  }

  within(part: string): Reader {
    return new Reader(this.file, `${this.where}.${part}`);
  }

  fault(field: string, given: unknown, expected: string): NotebookError {
    return new NotebookError(this.file, `${this.where}.${field} is ${describe(given)}; expected ${expected}`);
  }

  object(value: unknown): Fields {
    return object(value, (given) => new NotebookError(this.file, `${this.where} is ${given}; expected an object`));
  }

  record(from: Fields, field: string): Bundle {
    return object(from[field], () => this.fault(field, from[field], "an object"));
  }

  list(from: Fields, field: string): readonly unknown[] {
    const value = from[field];
    if (!Array.isArray(value)) throw this.fault(field, value, "a list");
    return value;
  }

  integer(from: Fields, field: string): number {
    const value = from[field];
    if (typeof value !== "number" || !Number.isInteger(value)) throw this.fault(field, value, "an integer");
    return value;
  }

  count(from: Fields): number | null {
    const value = from.execution_count;
    return value === null || value === undefined ? null : this.integer(from, "execution_count");
  }

  /** A text, which the format may store as a list of lines. */
  text(from: Fields, field: string): string {
    const joined = joinLines(from[field]);
    if (typeof joined !== "string") throw this.fault(field, from[field], "text or a list of lines");
    return joined;
  }

  bundle(from: Fields, field: string): Bundle {
    const entries = Object.entries(this.record(from, field));
    return Object.fromEntries(entries.map(([mime, value]) => [mime, isJsonMime(mime) ? value : joinLines(value)]));
  }
}

function joinLines(value: unknown): unknown {
  return Array.isArray(value) && value.every((line) => typeof line === "string") ? value.join("") : value;
}
