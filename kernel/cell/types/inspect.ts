// Inspection: signature and documentation of what stands at the cursor.
import type { MimeBundle } from "../port.ts";
import { codeBlock, inspectionHtml } from "./documentation.ts";
import { draft } from "./draft.ts";
import { withoutPlaces } from "./names-of-types.ts";
import type { NotebookTypes } from "./service.ts";
import { type TS, ts } from "./typescript.ts";

export interface Inspection {
  readonly data: MimeBundle;
  /** The variable of the notebook that was asked about. */
  readonly name?: string;
}

/** What is known at an offset; undefined if nothing. */
export function inspect(types: NotebookTypes, code: string, offset: number, detail: 0 | 1): Inspection | undefined {
  const { file, edited } = draft(types, code);
  for (const place of places(code, offset)) {
    const at = edited.toEdited(place);
    const found = types.service.getQuickInfoAtPosition(file, at);
    if (!found || isNothing(found)) continue;
    const text = code.slice(
      edited.toUser(found.textSpan.start),
      edited.toUser(found.textSpan.start + found.textSpan.length),
    );
    const known = types.names.get(text) !== undefined && !isMember(code, edited.toUser(found.textSpan.start));
    return { data: bundle(types, file, at, found, detail), ...(known && { name: text }) };
  }
  return undefined;
}

// A name that is declared nowhere: the service gives it the type any, and no kind.
function isNothing({ kind, displayParts = [] }: TS.QuickInfo): boolean {
  return kind === "" && displayParts.map(({ text }) => text).join("") === "any";
}

function isMember(code: string, start: number): boolean {
  return /\.\s*$/.test(code.slice(0, start));
}

/** Offsets to try: at the name, just behind it, at the name before the bracket that encloses the cursor. */
function places(code: string, offset: number): number[] {
  const tried = [offset, offset - 1];
  let depth = 0;
  for (let at = offset - 1; at >= 0; at--) {
    if (/[)\]}]/.test(code[at] as string)) depth++;
    else if (/[([{]/.test(code[at] as string) && depth-- === 0) {
      tried.push(at - 1);
      break;
    }
  }
  return tried.filter((at) => at >= 0 && at <= code.length);
}

function bundle(types: NotebookTypes, file: string, at: number, info: TS.QuickInfo, detail: 0 | 1): MimeBundle {
  const signature = signatureOf(info);
  const documentation = ts.displayPartsToString(info.documentation);
  const tags = (info.tags ?? []).map((tag) => `@${tag.name} ${ts.displayPartsToString(tag.text)}`.trimEnd());
  const source = detail === 1 ? sourceOf(types, file, at) : undefined;
  const plain = [signature, documentation, ...tags, source];
  const markdown = [fenced(signature), sections(documentation), ...tags.map(example), source && fenced(source)];
  const html = [inspectionHtml(signature, documentation, tags), source && codeBlock(source)];
  return { "text/plain": joined(plain), "text/html": joined(html), "text/markdown": joined(markdown) };
}

function joined(parts: readonly (string | undefined)[]): string {
  return parts.filter((part) => part).join("\n\n");
}

/** "lattice(input: LatticeInput): Lattice", without the words of the import that the machinery made. */
function signatureOf(info: TS.QuickInfo): string {
  const shown = withoutPlaces(ts.displayPartsToString(info.displayParts));
  return shown
    .split("\n")
    .filter((line) => !line.startsWith("import "))
    .join("\n")
    .replace(/^\((?:alias|property|method|getter|setter)\) /, "");
}

function fenced(code: string): string {
  return `\`\`\`typescript\n${code}\n\`\`\``;
}

/** The labelled parts of a docstring (Domain, Error, Source, ...) as a list with bold labels. */
function sections(documentation: string): string {
  return documentation.replace(/^([A-Z][a-z]+) {2,}(?=\S)/gm, "- **$1** ");
}

function example(tag: string): string {
  return tag.startsWith("@example ") ? fenced(tag.slice("@example ".length)) : tag.replace(/^@(\w+)/, "**$1**");
}

function sourceOf(types: NotebookTypes, file: string, at: number): string | undefined {
  const definition = types.service.getDefinitionAtPosition(file, at)?.[0];
  if (!definition) return undefined;
  const text = types.service.getProgram()?.getSourceFile(definition.fileName)?.text;
  const span = definition.contextSpan ?? definition.textSpan;
  return text?.slice(span.start, span.start + span.length);
}
