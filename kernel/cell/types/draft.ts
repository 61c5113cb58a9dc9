// The cell being typed, as a file with every name of the notebook and of the library in scope.
import { EditedText, inOrder } from "./edits.ts";
import { exportEdits } from "./exports.ts";
import { surroundings } from "./notebook.ts";
import { operatorEdits, operatorImport, operatorPrefix, typesPrefix } from "./operators.ts";
import { type Outline, outline } from "./outline.ts";
import { CURRENT, type NotebookTypes } from "./service.ts";

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
  types.readNodeIfNeeded(code, parsed);
  const operators = operatorPrefix(code);
  const edits = [...exportEdits(parsed.source).edits, ...operatorEdits(parsed.source, operators)];
  const edited = new EditedText(code, inOrder(edits));
  const around = surroundings(() => true, parsed.declared, types.names, types.libraryNames(), typesPrefix(operators));
  types.host.setCell(CURRENT, `${edited.text}${around.text}\n${operatorImport(operators)}`, true);
  return { file: types.host.cellFile(CURRENT), edited, parsed, operators };
}
