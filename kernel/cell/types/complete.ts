// Completion: what may follow the cursor.
import type { Completion, CompletionList } from "../port.ts";
import { draft } from "./draft.ts";
import type { NotebookTypes } from "./service.ts";
import { type TS, ts } from "./typescript.ts";

const MOST = 300;

/** Words of the front ends for the compiler's kinds. */
const KINDS: Readonly<Record<string, string>> = {
  method: "function",
  function: "function",
  "local function": "function",
  const: "variable",
  let: "variable",
  var: "variable",
  "local var": "variable",
  parameter: "variable",
  getter: "property",
  setter: "property",
  property: "property",
  class: "class",
  interface: "interface",
  type: "type",
  enum: "class",
  module: "module",
  "external module name": "module",
  keyword: "keyword",
  alias: "variable",
  string: "value",
};

/** Completions at an offset; an empty list where there is nothing to say. */
export function complete(types: NotebookTypes, code: string, offset: number): CompletionList {
  const prefix = wordBefore(code, offset);
  const start = offset - prefix.length;
  const { file, edited } = draft(types, code);
  const list = types.service.getCompletionsAtPosition(file, edited.toEdited(offset), {
    includeCompletionsWithInsertText: false,
    includeCompletionsForModuleExports: false,
    includeSymbol: true,
  });
  const entries = (list?.entries ?? []).filter((entry) => fits(entry, prefix)).sort(bySortText);
  return { start, end: offset, matches: entries.slice(0, MOST).map(completion) };
}

/** The part of a name that stands before the cursor. */
function wordBefore(code: string, offset: number): string {
  return /[\p{ID_Continue}$]*$/u.exec(code.slice(0, offset))?.[0] ?? "";
}

function fits(entry: TS.CompletionEntry, prefix: string): boolean {
  return entry.kind !== ts.ScriptElementKind.warning && entry.name.toLowerCase().startsWith(prefix.toLowerCase());
}

function bySortText(a: TS.CompletionEntry, b: TS.CompletionEntry): number {
  if (a.sortText !== b.sortText) return a.sortText < b.sortText ? -1 : 1;
  return a.name < b.name ? -1 : a.name > b.name ? 1 : 0;
}

function completion(entry: TS.CompletionEntry): Completion {
  return { text: entry.name, type: KINDS[entry.kind] ?? "variable" };
}
