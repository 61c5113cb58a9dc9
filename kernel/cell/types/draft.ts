// The cell being typed, as a file with every name of the notebook and of the library in scope.
import { EditedText } from "./edits.ts";
import { exportEdits } from "./exports.ts";
import { surroundings } from "./notebook.ts";
import { type Outline, outline } from "./outline.ts";
import type { NotebookTypes } from "./service.ts";

/** Number of the draft's file; no cell has it. */
const DRAFT = 999_999_999;

export interface Draft {
  readonly file: string;
  readonly edited: EditedText;
  readonly parsed: Outline;
}

/** Puts the text of a draft before the checker. */
export function draft(types: NotebookTypes, code: string): Draft {
  const parsed = outline(code);
  const edited = new EditedText(code, exportEdits(parsed.source).edits);
  const around = surroundings(() => true, parsed.declared, types.names, types.libraryNames());
  types.host.setCell(DRAFT, edited.text + around.text, true);
  return { file: types.host.cellFile(DRAFT), edited, parsed };
}
