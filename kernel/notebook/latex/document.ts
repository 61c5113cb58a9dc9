// A notebook as the LaTeX source of a short paper. It compiles with pdfTeX, XeTeX and LuaTeX and needs what any
// installation has; figures are files beside it.
import { prose } from "../../../lib/page/prose.ts";
import { type Cell, type CodeCell, isCode, type Notebook, type Output } from "../format.ts";
import { splitFormulas } from "../page/mathematics.ts";
import { plainText } from "../page/terminal.ts";
import { sourcesOf } from "../sources.ts";
import { VALUE_TYPE } from "../values.ts";
import { formulaTex, textTex } from "./characters.ts";
import { type Drawing, readDrawing } from "./drawing.ts";
import { breakable, displayTex, sentenceTex } from "./formulas.ts";
import { labelsTex } from "./labels.ts";
import { codeLines, markdownTex } from "./markdown.ts";
import { PREAMBLE } from "./preamble.ts";

/** A picture of the paper: its file name without extension, and what it shows. */
export interface Picture {
  readonly name: string;
  readonly mime: "image/svg+xml" | "image/png" | "image/jpeg";
  /** SVG text, or base64. */
  readonly data: string;
  /** A figure of ours, whose labels stand in the paper itself. */
  readonly drawing?: Drawing;
}

export interface LatexPaper {
  readonly tex: string;
  readonly pictures: readonly Picture[];
}

export interface LatexOptions {
  /** Name of the notebook: title if it has no heading, and beginning of the names of its pictures. */
  readonly name: string;
  /** A line at the end: what computed it. */
  readonly colophon?: string;
}

export function notebookLatex(notebook: Notebook, { name, colophon = "" }: LatexOptions): LatexPaper {
  const writer = new PaperWriter(notebook, name);
  const body = writer.body();
  const { title } = notebook.metadata;
  const heading = typeof title === "string" && title.trim() !== "" ? textTex(title) : (writer.title ?? textTex(name));
  const tex = `${PREAMBLE}
\\title{${heading}}
\\author{${authors(notebook)}}
\\date{}
\\begin{document}
\\maketitle

${body}
${writer.bibliography()}${colophon ? `\n\\bigskip\\noindent{\\footnotesize ${textTex(colophon)}\\par}\n` : ""}
\\end{document}
`;
  return { tex, pictures: writer.pictures };
}

/** `authors` of the notebook's metadata, as the format has them. */
function authors(notebook: Notebook): string {
  const { authors: list } = notebook.metadata;
  if (!Array.isArray(list)) return "";
  const names = list.map((author) => (typeof author === "object" && author !== null ? String(author.name ?? "") : ""));
  return names
    .filter((author) => author !== "")
    .map(textTex)
    .join(" \\and ");
}

class PaperWriter {
  readonly pictures: Picture[] = [];
  title: string | undefined;
  readonly #notebook: Notebook;
  readonly #name: string;
  readonly #sources: string[] = [];

  constructor(notebook: Notebook, name: string) {
    this.#notebook = notebook;
    this.#name = name;
  }

  body(): string {
    return this.#notebook.cells
      .map((cell) => this.#cell(cell))
      .filter((part) => part !== "")
      .join("\n\n");
  }

  bibliography(): string {
    if (this.#sources.length === 0) return "";
    const items = this.#sources.map(
      (source, index) => `\\bibitem{source-${index + 1}} ${sentenceTex(splitFormulas(source))}`,
    );
    return `\n\\begin{thebibliography}{99}\n${items.join("\n")}\n\\end{thebibliography}\n`;
  }

  #cell(cell: Cell): string {
    if (isCode(cell)) return this.#codeCell(cell);
    if (cell.cell_type === "raw" || cell.source.trim() === "") return "";
    const picture = (mime: string, data: string, alt: string) => this.#picture(mime as Picture["mime"], data, alt);
    const { attachments = {} } = cell;
    const parts = markdownTex(cell.source, { takeTitle: this.title === undefined, attachments, picture });
    this.title ??= parts.title;
    return parts.tex;
  }

  #codeCell(cell: CodeCell): string {
    const jupyter = cell.metadata.jupyter as Record<string, unknown> | undefined;
    const code = jupyter?.source_hidden === true || cell.source.trim() === "" ? "" : codeLines(plainText(cell.source));
    const outputs = jupyter?.outputs_hidden === true ? [] : cell.outputs.map((output) => this.#output(output));
    return [code, ...outputs].filter((part) => part !== "").join("\n");
  }

  #output(output: Output): string {
    if (output.output_type === "stream") return `\\begin{said}\n${codeLines(plainText(output.text))}\n\\end{said}`;
    if (output.output_type === "error") {
      const trace = plainText(output.traceback.join("\n")) || `${output.ename}: ${output.evalue}`;
      return `\\begin{said}\n${codeLines(trace)}\n\\end{said}`;
    }
    const { data } = output;
    const svg = data["image/svg+xml"];
    if (typeof svg === "string") return this.#picture("image/svg+xml", svg, titleOf(svg));
    for (const mime of ["image/png", "image/jpeg"] as const) {
      const base64 = data[mime];
      if (typeof base64 === "string") return this.#picture(mime, base64, "picture");
    }
    const cited = this.#cite(data[VALUE_TYPE]);
    const latex = data["text/latex"];
    if (typeof latex === "string" && latex.trim() !== "") return valueTex(latex.trim()) + cited;
    const markdown = data["text/markdown"];
    if (typeof markdown === "string") return markdownTex(markdown, { picture: () => "" }).tex;
    const plain = data["text/plain"];
    return typeof plain === "string" ? `\\begin{said}\n${codeLines(plainText(plain))}\n\\end{said}` : "";
  }

  #picture(mime: Picture["mime"], data: string, alt: string): string {
    const name = `${this.#name.replace(/[^\w-]+/g, "-")}-figure-${this.pictures.length + 1}`;
    const drawing = mime === "image/svg+xml" ? readDrawing(data) : undefined;
    this.pictures.push({ name, mime, data, ...(drawing ? { drawing } : {}) });
    if (drawing) {
      const { width, height } = drawing;
      return `\\drawing{${name}}{${sentenceTex(splitFormulas(prose(alt)))}}{${width}}{${height}}{%\n${labelsTex(drawing)}}`;
    }
    return `\\picturefile{${name}}{${textTex(alt)}}`;
  }

  /** The sources that a value cites, as references into the bibliography. */
  #cite(value: unknown): string {
    const keys = sourcesOf(value).map((source) => {
      const known = this.#sources.indexOf(source);
      if (known >= 0) return known + 1;
      return this.#sources.push(source);
    });
    const list = [...new Set(keys)].map((key) => `source-${key}`).join(",");
    return list === "" ? "" : `\n\\note{Sources: \\cite{${list}}.}`;
  }
}

function titleOf(svg: string): string {
  const title = /<title[^>]*>([^<]*)<\/title>/.exec(svg)?.[1] ?? "figure";
  return title
    .replace(/&lt;/g, "<")
    .replace(/&gt;/g, ">")
    .replace(/&quot;/g, '"')
    .replace(/&amp;/g, "&");
}

/** LaTeX of a value: a part of a paper as it stands, a displayed formula, or a sentence with formulas. */
function valueTex(latex: string): string {
  if (/^\\(?:paragraph|begin\{enumerate\}|subsubsection)/.test(latex)) {
    return breakable(formulaTex(latex)).replace(/\\\[\s*([\s\S]*?)\s*\\\]/g, "\\shown{$1}");
  }
  const pieces = splitFormulas(latex);
  const [only] = pieces;
  if (pieces.length === 1 && only?.kind === "formula") return displayTex(only.tex);
  if (!pieces.some((piece) => piece.kind === "formula")) return displayTex(latex);
  return `\\statement{${sentenceTex(pieces)}}`;
}
