// The cell being typed, as a file with every name of the notebook and of the library in scope.
import { EditedText, inOrder } from "./edits.ts";
import { exportEdits } from "./exports.ts";
import { surroundings } from "./notebook.ts";
import { operatorEdits, operatorImport, operatorPrefix } from "./operators.ts";
import { type Outline, outline } from "./outline.ts";
import type { NotebookTypes } from "./service.ts";

/** Number of the draft's file; no cell has it. */
const DRAFT = 999_999_999;

export interface Draft {
  readonly file: string;
  readonly edited: EditedText;
  readonly parsed: Outline;
  /** Name of the operators' module in the text. */
  readonly operators: string;
}

/** Puts the text of a draft before the checker. */
export function draft(types: NotebookTypes, code: string): Draft {
  const parsed = outline(code);
  const operators = operatorPrefix(code);
  const edits = [...exportEdits(parsed.source).edits, ...operatorEdits(parsed.source, operators)];
  const edited = new EditedText(code, inOrder(edits));
  const around = surroundings(() => true, parsed.declared, types.names, types.libraryNames());
  types.host.setCell(DRAFT, `${edited.text}${around.text}\n${operatorImport(operators)}`, true);
  return { file: types.host.cellFile(DRAFT), edited, parsed, operators };
}
