// Completion: what may follow the cursor. Types answer; no code of the user runs.
import type { Completion, CompletionList } from "../port.ts";
import { draft } from "./draft.ts";
import { lettersBefore } from "./letters.ts";
import { withoutPlaces } from "./names-of-types.ts";
import type { NotebookTypes } from "./service.ts";
import { type TS, ts } from "./typescript.ts";

const MOST = 300;
/** Details cost about a millisecond each: only a list that a person reads through gets them. */
const MOST_DETAILED = 40;

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
  const letters = lettersBefore(code, offset);
  if (letters) {
    const matches = letters.letters.map((text) => ({ text, type: "letter" }));
    return { start: letters.start, end: offset, matches };
  }
  const prefix = wordBefore(code, offset);
  const { file, edited, operators } = draft(types, code);
  const at = edited.toEdited(offset);
  const list = types.service.getCompletionsAtPosition(file, at, { includeCompletionsForModuleExports: false });
  const entries = (list?.entries ?? [])
    .filter((entry) => fits(entry, prefix) && !entry.name.startsWith(operators))
    .sort(bySortText)
    .slice(0, MOST);
  const members = list?.isMemberCompletion ?? false;
  const detailed = entries.length <= MOST_DETAILED;
  const matches = entries.map((entry) => completion(entry, detailed ? details(types, file, at, entry) : undefined));
  if (!members && prefix !== "") matches.push(...unread(types, prefix, matches));
  return { start: offset - prefix.length, end: offset, matches };
}

/** Globals of Node's that the checker has not read yet. */
function unread(types: NotebookTypes, prefix: string, known: readonly Completion[]): Completion[] {
  return types.unreadGlobals
    .filter((name) => name.toLowerCase().startsWith(prefix.toLowerCase()) && !known.some((one) => one.text === name))
    .map((text) => ({ text, type: "variable" }));
}

/** The part of a name that stands before the cursor. */
function wordBefore(code: string, offset: number): string {
  return /[\p{ID_Continue}$]*$/u.exec(code.slice(0, offset))?.[0] ?? "";
}

function fits(entry: TS.CompletionEntry, prefix: string): boolean {
  if (entry.kind === ts.ScriptElementKind.warning || !/^[\p{ID_Continue}$]+$/u.test(entry.name)) return false;
  if (entry.kind === ts.ScriptElementKind.keyword && prefix === "") return false;
  return entry.name.toLowerCase().startsWith(prefix.toLowerCase());
}

function bySortText(a: TS.CompletionEntry, b: TS.CompletionEntry): number {
  if (a.sortText !== b.sortText) return a.sortText < b.sortText ? -1 : 1;
  return a.name < b.name ? -1 : a.name > b.name ? 1 : 0;
}

function details(types: NotebookTypes, file: string, at: number, entry: TS.CompletionEntry) {
  return types.service.getCompletionEntryDetails(file, at, entry.name, {}, entry.source, undefined, entry.data);
}

function completion(entry: TS.CompletionEntry, found: TS.CompletionEntryDetails | undefined): Completion {
  const kind = found?.kind === ts.ScriptElementKind.alias ? entry.kind : (found?.kind ?? entry.kind);
  const signature = found && signatureOf(found);
  return { text: entry.name, type: KINDS[kind] ?? "variable", ...(signature && { signature }) };
}

/** "(z: ComplexNumeric): Complex — The function ℘ ..." */
function signatureOf(found: TS.CompletionEntryDetails): string {
  const shown = withoutPlaces(ts.displayPartsToString(found.displayParts)).split("\n")[0] as string;
  const bare = shown
    .replace(/^\((?:method|property|getter|alias|function|const)\) /, "")
    .replace(/^(?:[\w.<>]+\.)?[\p{ID_Continue}$]+(?=[(:<])/u, "");
  const line = ts.displayPartsToString(found.documentation).split("\n")[0] ?? "";
  return [bare.trim(), line]
    .filter((part) => part !== "")
    .join(" — ")
    .slice(0, 300);
}
