// Text cells as LaTeX: the tokens of the Markdown reader, one rule each. HTML inside Markdown is dropped to its words.
import type { Bundle } from "../format.ts";
import { markdownParser } from "../page/markdown.ts";
import { codeTex, formulaTex, textTex } from "./characters.ts";
import { breakable } from "./formulas.ts";

type Token = ReturnType<ReturnType<typeof markdownParser>["parse"]>[number];

export interface MarkdownParts {
  readonly tex: string;
  /** The first heading of the first level, if `takeTitle` was asked for; it is not in `tex` then. */
  readonly title?: string;
}

interface Formula {
  readonly tex: string;
  readonly display: boolean;
}

const LEVELS = ["section*", "section*", "subsection*", "subsubsection*", "paragraph*", "paragraph*"];

const WRAPS: Readonly<Record<string, readonly [string, string]>> = {
  em: ["\\emph{", "}"],
  strong: ["\\textbf{", "}"],
  s: ["", ""],
  paragraph: ["", "\n\n"],
  bullet_list: ["\\begin{itemize}\n", "\\end{itemize}\n\n"],
  ordered_list: ["\\begin{enumerate}\n", "\\end{enumerate}\n\n"],
  list_item: ["\\item ", "\n"],
  blockquote: ["\\begin{quote}\n", "\\end{quote}\n\n"],
};

/** Environments of displayed mathematics that stand in a text by themselves. */
const ENVIRONMENT = /^\\begin\{(?:equation|align|gather|multline|eqnarray|flalign|alignat)\*?\}/;

/** LaTeX of a Markdown text. `picture` writes a picture of the cell's attachments and gives its LaTeX. */
export function markdownTex(
  source: string,
  {
    takeTitle = false,
    attachments = {},
    picture,
  }: {
    readonly takeTitle?: boolean;
    readonly attachments?: Readonly<Record<string, Bundle>>;
    readonly picture: (mime: string, base64: string, alt: string) => string;
  },
): MarkdownParts {
  const formulas: Formula[] = [];
  const parser = markdownParser((tex, display) => {
    formulas.push({ tex, display });
    return String(formulas.length - 1);
  }, attachments);
  const tokens = parser.parse(source, {});
  let title: string | undefined;
  const writer = new TokenWriter(formulas, picture);
  const rest: Token[] = [];
  for (let at = 0; at < tokens.length; at++) {
    const token = tokens[at] as Token;
    const inline = tokens[at + 1];
    if (takeTitle && title === undefined && token.type === "heading_open" && token.tag === "h1" && inline) {
      title = writer.write([inline]).trim();
      at += 2;
    } else rest.push(token);
  }
  return { tex: writer.write(rest).trim(), ...(title === undefined ? {} : { title }) };
}

class TokenWriter {
  readonly #formulas: readonly Formula[];
  readonly #picture: (mime: string, base64: string, alt: string) => string;

  constructor(formulas: readonly Formula[], picture: (mime: string, base64: string, alt: string) => string) {
    this.#formulas = formulas;
    this.#picture = picture;
  }

  write(tokens: readonly Token[]): string {
    let out = "";
    for (let at = 0; at < tokens.length; at++) {
      const token = tokens[at] as Token;
      if (token.type === "table_open") {
        const end = tokens.findIndex((other, index) => index > at && other.type === "table_close");
        out += this.#table(tokens.slice(at, end));
        at = end;
      } else out += this.#one(token);
    }
    return out;
  }

  #one(token: Token): string {
    const [, kind = "", side] = /^(.*)_(open|close)$/.exec(token.type) ?? [];
    const wrap = WRAPS[kind];
    if (wrap) return side === "open" ? wrap[0] : wrap[1];
    switch (token.type) {
      case "inline":
        return this.write(token.children ?? []);
      case "text":
        return textTex(token.content);
      case "softbreak":
        return "\n";
      case "hardbreak":
        return "\\\\\n";
      case "heading_open":
        return `\\${LEVELS[Number(token.tag.slice(1)) - 1]}{`;
      case "heading_close":
        return "}\n\n";
      case "code_inline":
        return `\\texttt{${codeTex(token.content)}}`;
      case "fence":
      case "code_block":
        return `${codeLines(token.content)}\n\n`;
      case "hr":
        return "\\medskip\\begin{center}\\rule{4em}{0.4pt}\\end{center}\n\n";
      case "formula":
      case "display":
        return this.#formula(this.#formulas[Number(token.content)]);
      case "link_open":
        return linkOpen(String(token.attrGet("href") ?? ""));
      case "link_close":
        return "}";
      case "image":
        return this.#image(token);
      case "html_inline":
      case "html_block":
        return token.type === "html_block" ? `${textTex(token.content.replace(/<[^>]*>/g, ""))}\n\n` : "";
      default:
        return "";
    }
  }

  #formula(formula: Formula | undefined): string {
    if (!formula) return "";
    const tex = formulaTex(formula.tex);
    if (!formula.display) return `$${breakable(tex)}$`;
    return ENVIRONMENT.test(tex.trim()) ? `\n${tex.trim()}\n` : `\n\\[${breakable(tex).trim()}\\]\n`;
  }

  #image(token: Token): string {
    const source = String(token.attrGet("src") ?? "");
    const alt = token.content;
    const [, mime, base64] = /^data:(image\/(?:png|jpeg));base64,(.*)$/s.exec(source) ?? [];
    return mime && base64 ? this.#picture(mime, base64, alt) : `[${textTex(alt || source)}]`;
  }

  /** A table of pipes and dashes. */
  #table(tokens: readonly Token[]): string {
    const rows: string[][] = [];
    const alignment: string[] = [];
    let heads = 0;
    for (const [index, token] of tokens.entries()) {
      if (token.type === "tr_open") rows.push([]);
      if (token.type !== "th_open" && token.type !== "td_open") continue;
      rows.at(-1)?.push(this.write([tokens[index + 1] as Token]));
      if (rows.length > 1) continue;
      heads++;
      const style = String(token.attrGet("style") ?? "");
      alignment.push(/right/.test(style) ? "r" : /center/.test(style) ? "c" : "l");
    }
    const lines = rows.map((row, index) => `${row.join(" & ")} \\\\${index === 0 && heads > 0 ? "\\hline" : ""}`);
    return `\\begin{center}\\begin{tabular}{${alignment.join("")}}\n\\hline\n${lines.join("\n")}\n\\hline\n\\end{tabular}\\end{center}\n\n`;
  }
}

/** A link into the document goes to a label, another one to its address. */
function linkOpen(href: string): string {
  const inside = /^#([\w:.-]+)$/.exec(href)?.[1];
  if (inside !== undefined) return `\\hyperref[${inside}]{`;
  return /^(?:https?:|mailto:)/.test(href) ? `\\href{${href.replace(/([%#&\\{}])/g, "\\$1")}}{` : "{";
}

/** Lines of code, each of which may go on below with an indent. */
export function codeLines(source: string): string {
  const lines = source.replace(/\s+$/, "").split("\n");
  return `\\begin{code}\n${lines.map((line) => `\\codeline{${codeTex(line.replace(/\t/g, "  "))}}`).join("\n")}\n\\end{code}`;
}
