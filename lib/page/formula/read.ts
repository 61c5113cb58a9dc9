// Reads the TeX that stands in our tables and sentences: signs, indices, powers, fractions, roots, words. What it does not know
// it leaves to others: it then gives undefined.

import { SIGNS, type Sign, signOf } from "./symbols.ts";

export type Node =
  | ({ readonly kind: "sign"; readonly face: "plain" | "bold" | "upright" } & Sign)
  | { readonly kind: "words"; readonly text: string }
  | { readonly kind: "group"; readonly body: readonly Node[] }
  | { readonly kind: "scripts"; readonly base: Node; readonly low?: Node; readonly high?: Node }
  | { readonly kind: "fraction"; readonly above: Node; readonly below: Node }
  | { readonly kind: "root"; readonly body: Node }
  | { readonly kind: "accent"; readonly body: Node; readonly mark: string };

/** The formula as a tree; undefined where it holds something that has no place in a line. */
export function readFormula(tex: string): readonly Node[] | undefined {
  try {
    const reader = new Reader(tex.match(/\\[a-zA-Z]+|\\[\s\S]|[\s\S]/gu) ?? []);
    const body = reader.sequence();
    return reader.done ? body : undefined;
  } catch (error) {
    if (error instanceof Unreadable) return undefined;
    throw error;
  }
}

class Unreadable extends Error {}

const FACES: Readonly<Record<string, "bold" | "upright">> = {
  mathbb: "bold",
  mathbf: "bold",
  mathrm: "upright",
  operatorname: "upright",
};
/** Marks that combine with the letter before them. */
const ACCENTS: Readonly<Record<string, string>> = { hat: "\u0302", bar: "\u0304", overline: "\u0304", tilde: "\u0303" };

class Reader {
  readonly #tokens: readonly string[];
  #at = 0;

  constructor(tokens: readonly string[]) {
    this.#tokens = tokens;
  }

  get done(): boolean {
    return this.#at >= this.#tokens.length;
  }

  /** Nodes up to a closing brace, which is left, or the end. */
  sequence(): readonly Node[] {
    const nodes: Node[] = [];
    for (;;) {
      this.#skipSpace();
      if (this.done || this.#tokens[this.#at] === "}") return nodes;
      const token = this.#tokens[this.#at] ?? "";
      if (token === "_" || token === "^" || token === "'") nodes.push(this.#scripts(nodes.pop()));
      else pushed(nodes, this.#node());
    }
  }

  #scripts(base: Node | undefined): Node {
    if (!base) throw new Unreadable();
    const token = this.#tokens[this.#at++];
    if (token === "'") {
      const prime: Node = { kind: "sign", text: "′", role: "mark", face: "plain" };
      // A prime stands before an index: f'_2 and f_2' look the same.
      return base.kind === "scripts"
        ? { ...base, high: base.high ? group(base.high, prime) : prime }
        : { kind: "scripts", base, high: prime };
    }
    const script = this.#argument();
    const whole = base.kind === "scripts" ? base : { kind: "scripts" as const, base };
    if (token === "_") {
      if (whole.low) throw new Unreadable();
      return { ...whole, low: script };
    }
    return { ...whole, high: whole.high ? group(whole.high, script) : script };
  }

  #argument(): Node {
    this.#skipSpace();
    return this.#node();
  }

  #node(): Node {
    const token = this.#tokens[this.#at++];
    if (token === undefined || token === "}") throw new Unreadable();
    if (token === "{") return this.#braced();
    // A colon behind its word, as in T: τ + 1, is no ratio.
    if (token === ":" && /\s/.test(this.#tokens[this.#at] ?? "") && !/\s/.test(this.#tokens[this.#at - 2] ?? " "))
      return { kind: "words", text: ": " };
    if (!token.startsWith("\\")) return sign(signOf(token));
    return this.#command(token.slice(1));
  }

  #braced(): Node {
    const body = this.sequence();
    if (this.#tokens[this.#at++] !== "}") throw new Unreadable();
    return { kind: "group", body };
  }

  #command(name: string): Node {
    if (name === "frac" || name === "tfrac" || name === "dfrac")
      return { kind: "fraction", above: this.#argument(), below: this.#argument() };
    if (name === "sqrt") return this.#root();
    if (name === "text") return { kind: "words", text: this.#words() };
    if (name === "left" || name === "right" || name === "middle") return this.#bracket();
    const mark = ACCENTS[name];
    if (mark !== undefined) return { kind: "accent", body: this.#argument(), mark };
    const face = FACES[name];
    if (face !== undefined)
      return { kind: "sign", text: this.#words(), role: face === "bold" ? "letter" : "name", face };
    return sign(SIGNS.get(name));
  }

  #root(): Node {
    this.#skipSpace();
    if (this.#tokens[this.#at] === "[") throw new Unreadable();
    return { kind: "root", body: this.#argument() };
  }

  /** A bracket that grows is one of the plain size here. */
  #bracket(): Node {
    this.#skipSpace();
    if (this.#tokens[this.#at] !== ".") return this.#node();
    this.#at++;
    return { kind: "words", text: "" };
  }

  /** The characters of a braced argument as they stand. */
  #words(): string {
    this.#skipSpace();
    if (this.#tokens[this.#at] !== "{") return this.#tokens[this.#at++] ?? "";
    const end = this.#tokens.indexOf("}", this.#at);
    const inside = this.#tokens.slice(this.#at + 1, end);
    if (end < 0 || inside.some((token) => token === "{" || /^\\[a-zA-Z]/.test(token))) throw new Unreadable();
    this.#at = end + 1;
    return inside.map((token) => token.replace(/^\\/, "")).join("");
  }

  #skipSpace(): void {
    while (/^\s$/.test(this.#tokens[this.#at] ?? "")) this.#at++;
  }
}

/** Digits in a row are one number. */
function pushed(nodes: Node[], node: Node): void {
  const last = nodes.at(-1);
  if (node.kind === "sign" && node.role === "digit" && last?.kind === "sign" && last.role === "digit")
    nodes[nodes.length - 1] = { ...last, text: last.text + node.text };
  else nodes.push(node);
}

function sign(found: Sign | undefined): Node {
  if (!found) throw new Unreadable();
  return { kind: "sign", face: "plain", ...found };
}

function group(...body: readonly Node[]): Node {
  return { kind: "group", body };
}
