// TypeScript set quietly: comments lean, keywords are a little heavier, nothing is coloured.
import { escapeHtml } from "./escape.ts";

const KEYWORDS =
  "abstract|as|async|await|break|case|catch|class|const|continue|declare|default|do|else|enum|export|extends|finally|for|from|function|if|implements|import|in|instanceof|interface|let|new|of|private|protected|public|readonly|return|satisfies|static|super|switch|this|throw|try|type|typeof|var|void|while|yield";

/** Comments, then strings and names (so that no keyword is seen inside them), then keywords. */
const TOKEN =
  /(\/\/[^\n]*|\/\*[\s\S]*?\*\/)|("(?:\\.|[^"\\\n])*"|'(?:\\.|[^'\\\n])*'|`(?:\\.|[^`\\])*`)|(\.?[\p{L}_$][\p{L}\p{N}_$]*)/gu;
const IS_KEYWORD = new RegExp(`^(?:${KEYWORDS})$`);

export function codeHtml(source: string): string {
  let html = "";
  let at = 0;
  for (const match of source.matchAll(TOKEN)) {
    const [whole, comment, , word] = match;
    html += escapeHtml(source.slice(at, match.index));
    at = match.index + whole.length;
    const text = escapeHtml(whole);
    if (comment !== undefined) html += `<i>${text}</i>`;
    else html += word !== undefined && IS_KEYWORD.test(word) ? `<b>${text}</b>` : text;
  }
  return html + escapeHtml(source.slice(at));
}
