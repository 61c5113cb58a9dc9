// What a notebook keeps about the run that made its outputs, so that a later reader can tell what has changed since.
import { createHash } from "node:crypto";
import { packageVersion } from "../service/info.ts";
import { isCode, type Notebook } from "./format.ts";

/** Field of the notebook's metadata. */
const FIELD = "halfperiod";
/** Number of the conventions that results are stated in. */
const EDITION = "1";

export interface Stamp {
  readonly version: string;
  readonly edition: string;
  readonly runtime: string;
  /** Hash of the code cells, blind to comments and white space. */
  readonly code: string;
  /** ISO 8601. */
  readonly date: string;
}

export function makeStamp(notebook: Notebook): Stamp {
  return {
    version: packageVersion(),
    edition: EDITION,
    runtime: `node ${process.versions.node}`,
    code: codeHash(notebook),
    date: new Date().toISOString(),
  };
}

/** The notebook with a stamp of now in its metadata. */
export function stamped(notebook: Notebook): Notebook {
  return { ...notebook, metadata: { ...notebook.metadata, [FIELD]: makeStamp(notebook) } };
}

const FIELDS = ["version", "edition", "runtime", "code", "date"] as const;

/** The stamp of a notebook, undefined if it has none that can be read. */
export function readStamp(notebook: Notebook): Stamp | undefined {
  const stamp = notebook.metadata[FIELD] as Partial<Stamp> | null | undefined;
  return FIELDS.every((field) => typeof stamp?.[field] === "string") ? (stamp as Stamp) : undefined;
}

/** Has the code changed since the stamp was made? */
export function isEdited(stamp: Stamp, notebook: Notebook): boolean {
  return stamp.code !== codeHash(notebook);
}

/** What has changed between a stamp and now, in words. */
export function changesSince(stamp: Stamp, notebook: Notebook): string[] {
  const now = makeStamp(notebook);
  const notes: string[] = [];
  if (isEdited(stamp, notebook)) notes.push("the code was edited after the stored run");
  for (const [field, name] of [
    ["version", "halfperiod"],
    ["edition", "conventions, edition"],
    ["runtime", "runtime"],
  ] as const) {
    if (stamp[field] !== now[field]) notes.push(`${name}: ${stamp[field]} then, ${now[field]} now`);
  }
  return notes;
}

/** Comments and blanks of TypeScript; strings and templates are matched first, so that nothing in them counts. */
const TOKENS = /("(?:\\.|[^"\\\n])*"|'(?:\\.|[^'\\\n])*'|`(?:\\.|[^`\\])*`)|\/\/[^\n]*|\/\*[\s\S]*?\*\/|(\s+)/g;

function codeHash(notebook: Notebook): string {
  const hash = createHash("sha256");
  for (const cell of notebook.cells.filter(isCode)) hash.update(withoutLayout(cell.source)).update("\0");
  return `sha256:${hash.digest("hex")}`;
}

function withoutLayout(source: string): string {
  const spaced = source.replace(TOKENS, (_, text) => text ?? " ");
  return spaced.replace(/\s*([^\p{L}\p{N}_$\s])\s*/gu, "$1").trim();
}
