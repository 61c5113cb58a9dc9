// What a notebook keeps about the run that made its outputs, so that a later reader can tell what has changed since.
import { createHash } from "node:crypto";
import { packageVersion } from "../service/info.ts";
import { type CodeCell, isCode, type Notebook } from "./format.ts";
import { importedPackages, type Packages, packageChanges } from "./packages.ts";

/** Field of the notebook's metadata. */
const FIELD = "halfperiod";
/** Number of the conventions that results are stated in. */
const EDITION = "1";

export interface Stamp {
  /** Of the kernel; the library comes in the same package. */
  readonly version: string;
  readonly library?: string;
  readonly edition: string;
  readonly runtime: string;
  /** Proved digits: those asked for at the run, or those that the cells ask for. */
  readonly digits?: string;
  /** What the cells import besides the library. */
  readonly packages?: Packages;
  /** Hash of the code cells, blind to comments and white space. */
  readonly code: string;
  /** Of each code cell, in order. */
  readonly cells?: readonly string[];
  /** ISO 8601. */
  readonly date: string;
}

/** Where and how a notebook is run. */
export interface StampOptions {
  /** Folder of the notebook; imports are looked for from there. Without it they are not looked for. */
  readonly folder?: string | undefined;
  /** Digits asked for over what the cells say. */
  readonly digits?: number | undefined;
}

export function makeStamp(notebook: Notebook, { folder, digits }: StampOptions = {}): Stamp {
  return {
    version: packageVersion(),
    library: packageVersion(),
    edition: EDITION,
    runtime: `node ${process.versions.node}`,
    digits: digits === undefined ? digitsInCode(notebook) : `${digits} (asked for at the run)`,
    ...(folder === undefined ? {} : { packages: importedPackages(notebook, folder) }),
    code: codeHash(notebook),
    cells: codeCells(notebook).map(cellHash),
    date: new Date().toISOString(),
  };
}

/** The notebook with a stamp of now in its metadata. */
export function stamped(notebook: Notebook, options: StampOptions = {}): Notebook {
  return { ...notebook, metadata: { ...notebook.metadata, [FIELD]: makeStamp(notebook, options) } };
}

const REQUIRED = ["version", "edition", "runtime", "code", "date"] as const;

/** The stamp of a notebook, undefined if it has none that can be read. */
export function readStamp(notebook: Notebook): Stamp | undefined {
  const stamp = notebook.metadata[FIELD] as Partial<Stamp> | null | undefined;
  return REQUIRED.every((field) => typeof stamp?.[field] === "string") ? (stamp as Stamp) : undefined;
}

/** Has the code changed since the stamp was made? */
export function isEdited(stamp: Stamp, notebook: Notebook): boolean {
  return stamp.code !== codeHash(notebook);
}

/** What has changed between a stamp and now, in words; the code first. */
export function changesSince(stamp: Stamp, notebook: Notebook, options: StampOptions = {}): string[] {
  const now = makeStamp(notebook, options);
  const notes = isEdited(stamp, notebook) ? codeChanges(stamp, now) : [];
  for (const [field, name] of [
    ["version", "halfperiod"],
    ["library", "library"],
    ["edition", "conventions, edition"],
    ["runtime", "runtime"],
    ["digits", "proved digits"],
  ] as const) {
    // The library is told apart only where it is another one than the kernel.
    if (field === "library" && stamp.library === stamp.version) continue;
    if (stamp[field] !== undefined && stamp[field] !== now[field]) {
      notes.push(`${name}: ${stamp[field]} then, ${now[field]} now`);
    }
  }
  if (stamp.packages && now.packages) notes.push(...packageChanges(stamp.packages, now.packages));
  return notes;
}

/** What of the code is another than at the run: order, cells that are new or changed, cells that are gone. */
function codeChanges({ cells: before }: Stamp, { cells: now = [] }: Stamp): string[] {
  const edited = "the code was edited after the stored run";
  if (!before) return [edited];
  const left = [...before];
  const changed: number[] = [];
  for (const [index, hash] of now.entries()) {
    const at = left.indexOf(hash);
    if (at >= 0) left.splice(at, 1);
    else changed.push(index + 1);
  }
  if (changed.length === 0 && left.length === 0) {
    return ["the cells were put in another order after the stored run"];
  }
  if (changed.length === 0) return [`${edited}: ${count(left.length, "cell")} taken out`];
  return [`${edited}: code ${changed.length === 1 ? "cell" : "cells"} ${changed.join(", ")}`];
}

function count(number: number, word: string): string {
  return `${number} ${word}${number === 1 ? "" : "s"}`;
}

/**
 * Counts of execution that do not rise from cell to cell, in words: the stored results come from another order than the
 * one in which a rerun takes the cells.
 */
export function orderOfRun(notebook: Notebook): string | undefined {
  const counts = codeCells(notebook).flatMap(({ execution_count: number }) => (number === null ? [] : [number]));
  const rises = counts.every((number, index) => index === 0 || number > (counts[index - 1] as number));
  return rises ? undefined : `the stored results were made in another order: ${counts.join(", ")}`;
}

function codeCells(notebook: Notebook): CodeCell[] {
  return notebook.cells.filter(isCode).filter((cell) => cell.source.trim() !== "");
}

/** The counts in `provedDigits(50)` and its like, as the cells have them. */
function digitsInCode(notebook: Notebook): string {
  const asked = codeCells(notebook).flatMap(({ source }) => [...source.matchAll(/\bprovedDigits\(\s*(\d+)\s*\)/g)]);
  return asked.map(([, digits]) => digits).join(", ") || "as preset";
}

/** Comments and blanks of TypeScript; strings and templates are matched first, so that nothing in them counts. */
const TOKENS = /("(?:\\.|[^"\\\n])*"|'(?:\\.|[^'\\\n])*'|`(?:\\.|[^`\\])*`)|\/\/[^\n]*|\/\*[\s\S]*?\*\/|(\s+)/g;

function codeHash(notebook: Notebook): string {
  const hash = createHash("sha256");
  for (const cell of notebook.cells.filter(isCode)) hash.update(withoutLayout(cell.source)).update("\0");
  return `sha256:${hash.digest("hex")}`;
}

/** A short hash, enough to tell the cells of one notebook apart. */
function cellHash({ source }: CodeCell): string {
  return createHash("sha256").update(withoutLayout(source)).digest("hex").slice(0, 16);
}

function withoutLayout(source: string): string {
  const spaced = source.replace(TOKENS, (_, text) => text ?? " ");
  return spaced.replace(/\s*([^\p{L}\p{N}_$\s])\s*/gu, "$1").trim();
}
