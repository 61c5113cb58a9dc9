// The notebook document, nbformat 4, as this program holds it: texts are joined strings, unknown fields are kept.

export interface Bundle {
  readonly [mime: string]: unknown;
}

export interface StreamOutput {
  readonly output_type: "stream";
  readonly name: "stdout" | "stderr";
  readonly text: string;
}

export interface DisplayOutput {
  readonly output_type: "display_data";
  readonly data: Bundle;
  readonly metadata: Bundle;
}

export interface ResultOutput {
  readonly output_type: "execute_result";
  readonly execution_count: number | null;
  readonly data: Bundle;
  readonly metadata: Bundle;
}

export interface ErrorOutput {
  readonly output_type: "error";
  readonly ename: string;
  readonly evalue: string;
  readonly traceback: readonly string[];
}

export type Output = StreamOutput | DisplayOutput | ResultOutput | ErrorOutput;

interface CellBase {
  /** Present from minor version 5 on. */
  readonly id?: string;
  readonly metadata: Bundle;
  readonly source: string;
}

export interface CodeCell extends CellBase {
  readonly cell_type: "code";
  readonly execution_count: number | null;
  readonly outputs: readonly Output[];
}

export interface TextCell extends CellBase {
  readonly cell_type: "markdown" | "raw";
  /** Files that the text refers to as `attachment:name`: a MIME bundle a name. */
  readonly attachments?: Readonly<Record<string, Bundle>>;
}

export type Cell = CodeCell | TextCell;

export interface Notebook {
  readonly nbformat: 4;
  readonly nbformat_minor: number;
  readonly metadata: Bundle;
  readonly cells: readonly Cell[];
}

/** A notebook file that cannot be read or written; `file`, `given` and `hint` say it in parts. */
export class NotebookError extends Error {
  readonly file: string;
  readonly given: string;
  readonly hint: string;

  constructor(file: string, given: string, hint = "") {
    super(`${file}: ${given}${hint ? `. ${hint}` : ""}`);
    this.name = "NotebookError";
    this.file = file;
    this.given = given;
    this.hint = hint;
  }
}

/** Does the cell carry this tag, as front ends let a user set it? */
export function hasTag(cell: Cell, tag: string): boolean {
  const tags = cell.metadata.tags;
  return Array.isArray(tags) && tags.includes(tag);
}

export function isCode(cell: Cell): cell is CodeCell {
  return cell.cell_type === "code";
}
