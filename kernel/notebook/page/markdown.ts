// Markdown cells: CommonMark with tables, by markdown-it; formulas are taken out first and put back as MathML last,
// so that neither Markdown nor the cleaning of HTML sees them.
import MarkdownIt from "markdown-it";
import type { Bundle } from "../format.ts";
import { formulaAt, joined, mathml } from "./mathematics.ts";
import { sanitise } from "./sanitise.ts";

// Private-use characters stand for a formula: mark, number, mark.
const OPEN = "\uE0F0";
const CLOSE = "\uE0F1";

/** HTML of a Markdown text; `attachments` are the files of its cell. */
export function markdownHtml(source: string, attachments: Readonly<Record<string, Bundle>> = {}): string {
  const formulas: string[] = [];
  const keep = (tex: string, display: boolean) => {
    formulas.push(mathml(tex, display));
    return `${OPEN}${formulas.length - 1}${CLOSE}`;
  };
  const html = markdownParser(keep, attachments).render(source.replace(/[\uE0F0\uE0F1]/g, ""));
  const putBack = (text: string) => {
    const [first = "", ...behind] = text.replace(/>/g, "&gt;").split(OPEN);
    const set = behind.map((part) => {
      const [index = "", following = ""] = part.split(CLOSE);
      return joined(formulas[Number(index)] ?? "", following);
    });
    return first + set.join("");
  };
  return sanitise(html, { text: putBack });
}

/** A reader of Markdown that hands every formula to \`keep\` and puts its answer into the token. */
export function markdownParser(
  keep: (tex: string, display: boolean) => string,
  attachments: Readonly<Record<string, Bundle>>,
): InstanceType<typeof MarkdownIt> {
  const markdown = new MarkdownIt({ html: true, linkify: false, typographer: false });
  markdown.inline.ruler.before("escape", "formula", (state, silent) => {
    const formula = /[\\$]/.test(state.src[state.pos] ?? "") ? formulaAt(state.src, state.pos) : undefined;
    if (!formula || formula.end > state.posMax) return false;
    if (!silent) state.push("formula", "", 0).content = keep(formula.tex, formula.display);
    state.pos = formula.end;
    return true;
  });
  markdown.block.ruler.before(
    "paragraph",
    "display",
    (state, startLine, _endLine, silent) => {
      const start = (state.bMarks[startLine] ?? 0) + (state.tShift[startLine] ?? 0);
      const formula = /^(?:\$\$|\\\[|\\begin)/.test(state.src.slice(start, start + 6))
        ? formulaAt(state.src, start)
        : undefined;
      if (!formula) return false;
      const after = state.src.slice(formula.end).split("\n", 1)[0] ?? "";
      if (after.trim() !== "") return false;
      if (silent) return true;
      state.line = startLine + state.src.slice(start, formula.end).split("\n").length;
      state.push("display", "", 0).content = keep(formula.tex, true);
      return true;
    },
    { alt: ["paragraph", "blockquote", "list"] },
  );
  markdown.renderer.rules.formula = (tokens, index) => tokens[index]?.content ?? "";
  markdown.renderer.rules.display = (tokens, index) => `<p>${tokens[index]?.content ?? ""}</p>\n`;
  markdown.renderer.rules.th_open = (tokens, index, options, _env, self) => {
    tokens[index]?.attrSet("scope", "col");
    return self.renderToken(tokens, index, options);
  };
  const image = markdown.renderer.rules.image;
  markdown.renderer.rules.image = (tokens, index, options, env, self) => {
    const token = tokens[index];
    const inner = token && attached(String(token.attrGet("src")), attachments);
    if (inner) token.attrSet("src", inner);
    return image?.(tokens, index, options, env, self) ?? "";
  };
  return markdown;
}

function attached(source: string, attachments: Readonly<Record<string, Bundle>>): string | undefined {
  if (!source.startsWith("attachment:")) return undefined;
  const [mime, base64] = Object.entries(attachments[decodeURIComponent(source.slice(11))] ?? {})[0] ?? [];
  return mime && typeof base64 === "string" ? `data:${mime};base64,${base64.replace(/\s/g, "")}` : undefined;
}
