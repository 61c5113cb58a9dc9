// Inspection: signature and documentation of what stands at the cursor.
import type { MimeBundle } from "../port.ts";
import { draft } from "./draft.ts";
import type { NotebookTypes } from "./service.ts";
import { type TS, ts } from "./typescript.ts";

/** A bundle with text/plain and text/markdown; undefined if nothing is known there. */
export function inspect(types: NotebookTypes, code: string, offset: number, detail: 0 | 1): MimeBundle | undefined {
  const { file, edited } = draft(types, code);
  for (const at of places(code, offset)) {
    const found = types.service.getQuickInfoAtPosition(file, edited.toEdited(at));
    if (found) return bundle(types, file, edited.toEdited(at), found, detail);
  }
  return undefined;
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
  const signature = ts.displayPartsToString(info.displayParts).replace(/import\("[^"]*"\)\./g, "");
  const documentation = ts.displayPartsToString(info.documentation);
  const tags = (info.tags ?? []).map((tag) => `@${tag.name} ${ts.displayPartsToString(tag.text)}`.trimEnd());
  const source = detail === 1 ? sourceOf(types, file, at) : undefined;
  const plain = [signature, documentation, ...tags, source].filter((part) => part).join("\n\n");
  const markdown = [
    `\`\`\`typescript\n${signature}\n\`\`\``,
    documentation,
    ...tags,
    source && `\`\`\`typescript\n${source}\n\`\`\``,
  ];
  return { "text/plain": plain, "text/markdown": markdown.filter((part) => part).join("\n\n") };
}

function sourceOf(types: NotebookTypes, file: string, at: number): string | undefined {
  const definition = types.service.getDefinitionAtPosition(file, at)?.[0];
  if (!definition) return undefined;
  const program = types.service.getProgram();
  const text = program?.getSourceFile(definition.fileName)?.text;
  const span = definition.contextSpan ?? definition.textSpan;
  return text?.slice(span.start, span.start + span.length);
}
