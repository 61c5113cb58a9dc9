// Whether a cell is complete, by its brackets alone: the answer of last resort while the compiler is busy or loading.
import type { Completeness } from "./port.ts";

const CLOSERS: Readonly<Record<string, string>> = { "(": ")", "[": "]", "{": "}" };
const OPEN_END = /(?:[-+*/%&|^=<>?:,.(]|=>|\b(?:in|of|new|typeof|return|extends|instanceof))\s*$/;
const INDENT = "  ";

/** White space for the line that follows: that of the last line, one step deeper behind an opening bracket. */
export function indentOf(code: string): string {
  const last = code.trimEnd().split("\n").at(-1) ?? "";
  const own = /^\s*/.exec(last)?.[0] ?? "";
  return /[([{]\s*$|=>\s*$/.test(last) ? own + INDENT : own;
}

/** Brackets, strings, templates and comments; regular expressions are told from division by what stands before. */
export function balance(code: string): Completeness {
  const expected: string[] = [];
  const incomplete: Completeness = { status: "incomplete", indent: indentOf(code) };
  let bare = "";
  for (let at = 0; at < code.length; ) {
    const rest = code.slice(at);
    const skipped = skip(rest, bare);
    if (skipped === undefined) return incomplete;
    if (skipped > 0) {
      at += skipped;
      if (!/^\/[/*]/.test(rest)) bare += "x";
      continue;
    }
    const char = code[at] as string;
    if (char === "`") expected.push("`");
    else if (CLOSERS[char]) expected.push(CLOSERS[char]);
    else if (/[)\]}]/.test(char)) {
      if (expected.pop() !== char) return { status: "invalid" };
    }
    bare += char;
    at++;
    if (expected.at(-1) === "`") {
      const end = templateEnd(code, at);
      if (end === undefined) return incomplete;
      at = end.next;
      expected.pop();
      if (end.slot) expected.push("`}", "}");
    }
    if (expected.at(-1) === "`}") {
      // The slot has been closed: the template goes on.
      expected[expected.length - 1] = "`";
      const end = templateEnd(code, at);
      if (end === undefined) return incomplete;
      at = end.next;
      expected.pop();
      if (end.slot) expected.push("`}", "}");
    }
  }
  return expected.length > 0 || OPEN_END.test(bare) ? incomplete : { status: "complete" };
}

/** Length of the comment, string or regular expression at the start; 0 if there is none, undefined if it has no end. */
function skip(rest: string, before: string): number | undefined {
  if (rest.startsWith("//")) return rest.indexOf("\n") < 0 ? rest.length : rest.indexOf("\n");
  if (rest.startsWith("/*")) return rest.indexOf("*/") < 0 ? undefined : rest.indexOf("*/") + 2;
  const string = /^(?:"(?:[^"\\\n]|\\.)*"|'(?:[^'\\\n]|\\.)*')/s.exec(rest);
  if (string) return string[0].length;
  if (rest.startsWith("/") && !/[\w$)\]]\s*$/.test(before)) {
    return /^\/(?:[^/\\\n[]|\\.|\[(?:[^\]\\\n]|\\.)*\])+\/\w*/.exec(rest)?.[0].length ?? 0;
  }
  return 0;
}

/** Where the template text from `from` ends: behind its closing quote, or behind `${`. */
function templateEnd(code: string, from: number): { next: number; slot: boolean } | undefined {
  for (let at = from; at < code.length; at++) {
    if (code[at] === "\\") at++;
    else if (code[at] === "`") return { next: at + 1, slot: false };
    else if (code.startsWith("${", at)) return { next: at + 2, slot: true };
  }
  return undefined;
}
