// Text to numbers: exact expressions such as "(1+√5)/2" or "1/2 + 3/4 i", and measured ones such as "1.25 ± 1e-6" or "3.14...".
import { DomainError } from "../proof/errors.ts";
import * as ball from "./ball.ts";
import * as disc from "./disc.ts";
import { combine, power, root } from "./exactness.ts";
import type { Leaf } from "./leaf.ts";
import type { Enclosure, Exact } from "./origin.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";

/** A piece of text, or an inserted exact value, which counts as one bracketed factor. */
export type Piece = string | Exact;

/**
 * Reads an exact expression: integers, decimals, fractions, i, √n or sqrt(n), + − * / ^ and brackets, over Q or one quadratic field.
 * Throws DomainError with the position of what does not fit.
 */
export function readExact(pieces: readonly Piece[], subject: string): Exact {
  const reader = new Reader(tokens(pieces, subject), subject, pieces);
  const value = reader.sum();
  reader.end();
  return value;
}

/** Reads any number as text, measured ones and digits that go on ("3.14...") included. */
export function readNumber(text: string, subject: string): Leaf {
  const parts = text.split(/±|\+\/-/);
  if (parts.length > 2) fail(subject, [text], text.lastIndexOf("±"), "one ±");
  if (parts.length === 2) return measured(parts[0]!, parts[1]!, text, subject);
  if (/\.\.\.|…/.test(text)) return continued(text, subject);
  return { exact: readExact([text], subject), standing: "exact" };
}

function measured(middle: string, radius: string, text: string, subject: string): Leaf {
  const centre = readPart(text, 0, middle.length, subject);
  const r = readPart(text, text.length - radius.length, text.length, subject);
  if (!(r instanceof Rational) || r.num < 0n) fail(subject, [text], middle.length + 1, "a radius that is not negative");
  return { enclosure: widened(centre, r as Rational, hasUnit(middle)), standing: "measured", source: text.trim() };
}

/** A part of the text, refused with its position in the whole. */
function readPart(text: string, from: number, to: number, subject: string): Exact {
  const padded = " ".repeat(from) + text.slice(from, to);
  try {
    return readExact([padded], subject);
  } catch (error) {
    if (!(error instanceof DomainError)) throw error;
    const given = error.given.replace(JSON.stringify(padded), () => JSON.stringify(text));
    throw new DomainError({ subject, given, expected: error.expected, hint: error.hint, argument: "text" });
  }
}

/** "3.14..." stands for any number within one unit of its last place; in "1.5... + 0.2... i" each part does. */
function continued(text: string, subject: string): Leaf {
  const unit = { re: Rational.zero, im: Rational.zero };
  const plain = text.replace(
    /(\d+)(?:\.(\d*?))?(?:\.\.\.|…)(e[-+]?\d+)?(\s*\*?\s*i\b)?/gi,
    (_all, whole: string, fraction: string | undefined, e: string | undefined, turn: string | undefined) => {
      const places = fraction?.length ?? 0;
      const last = Rational.parse(`1e${Number(e?.slice(1) ?? 0) - places}`);
      const key = turn ? "im" : "re";
      if (last.compare(unit[key]) > 0) unit[key] = last;
      return `${whole}${fraction ? `.${fraction}` : ""}${e ?? ""}${turn ?? ""}`;
    },
  );
  const centre = readExact([plain], subject);
  // The corner of the two units lies within their sum.
  return {
    enclosure: widened(centre, unit.re.plus(unit.im), hasUnit(plain)),
    standing: "measured",
    source: text.trim(),
  };
}

/** Whether a text speaks of complex numbers, even if its middle is real: "(1 + 0 i) ± 1e-6". */
function hasUnit(text: string): boolean {
  return /i/.test(text);
}

/** The smallest enclosure at hand of all numbers within r of the exact centre: all complex ones if it is complex, or if asked so. */
export function widened(centre: Exact, r: Rational, plane = false): Enclosure {
  const size = r.num === 0n ? 64 : accuracyBits(centre, r);
  const middle = centre instanceof Rational ? ball.fromRational(centre, size) : centre.enclosure(size);
  const radius = ball.fromRational(r, 40);
  if (!("axis" in middle) && !plane) return ball.widenBy(middle, radius, size);
  return disc.widenBy("axis" in middle ? middle : disc.fromBall(middle), radius, size, false);
}

// Bits of the centre down to 2^-32 of the radius.
function accuracyBits(centre: Exact, r: Rational): number {
  const rough = centre instanceof Rational ? ball.fromRational(centre, 32) : centre.enclosure(32);
  const size = "axis" in rough ? disc.magnitude(rough) : ball.magnitude(rough);
  return Math.max(40, (Number.isFinite(size) ? size : 0) - ball.magnitude(ball.fromRational(r, 32)) + 40);
}

interface Token {
  readonly kind: "number" | "sign" | "value" | "name";
  readonly text: string;
  readonly at: number;
  readonly piece: number;
  readonly spaced: boolean;
  readonly value?: Exact;
}

// The commands are those of TeX; spacing and \\left, \\right say nothing.
const PATTERN =
  /(?:\s|\\[,;! ]|\\left(?=\()|\\right(?=\)))*(?:(\d+\.?\d*(?:[eE][-+−]?\d+)?|\.\d+(?:[eE][-+−]?\d+)?)|(\*\*|\\cdot(?![a-z])|\\times(?![a-z])|[-+−*/^()·×√{}])|(\\?sqrt|\\[dt]?frac|i))/y;

/** One spelling for each sign and name. */
const SPELLED: Readonly<Record<string, string>> = {
  "\\cdot": "·",
  "\\times": "×",
  sqrt: "√",
  "√": "√",
  "\\frac": "frac",
  "\\dfrac": "frac",
  "\\tfrac": "frac",
};

function tokens(pieces: readonly Piece[], subject: string): Token[] {
  const found: Token[] = [];
  pieces.forEach((text, piece) => {
    if (typeof text !== "string") {
      found.push({ kind: "value", text: text.toString(), at: 0, piece, spaced: true, value: text });
      return;
    }
    PATTERN.lastIndex = 0;
    const end = text.trimEnd().length;
    while (PATTERN.lastIndex < end) {
      const at = PATTERN.lastIndex;
      const match = PATTERN.exec(text);
      if (!match)
        fail(
          subject,
          pieces,
          offset(pieces, piece) + at + (/^\s*/.exec(text.slice(at))?.[0].length ?? 0),
          "a number, i, √, an operator or a bracket",
        );
      const [all, number, sign, name] = match!;
      const word = number ?? sign ?? name!;
      const kind = number !== undefined ? "number" : sign !== undefined ? "sign" : "name";
      const start = at + all!.length - word.length;
      found.push({ kind, text: SPELLED[word] ?? word, at: start, piece, spaced: all!.length > word.length });
    }
  });
  return found;
}

function offset(pieces: readonly Piece[], piece: number): number {
  return pieces.slice(0, piece).reduce<number>((sum, p) => sum + p.toString().length, 0);
}

function fail(subject: string, pieces: readonly Piece[], at: number, expected: string, hint = ""): never {
  const text = pieces.map((p) => p.toString()).join("");
  const found = at >= text.length ? "the end of" : `${JSON.stringify(text[at])} at position ${at + 1} of`;
  throw new DomainError({ subject, given: `${found} ${JSON.stringify(text)}`, expected, hint, argument: "text" });
}

/** Recursive descent: sum of products of powers; juxtaposition is a product. */
class Reader {
  private next = 0;
  private readonly list: readonly Token[];
  private readonly subject: string;
  private readonly pieces: readonly Piece[];

  constructor(list: readonly Token[], subject: string, pieces: readonly Piece[]) {
    this.list = list;
    this.subject = subject;
    this.pieces = pieces;
  }

  sum(): Exact {
    let value = this.signed();
    for (let t = this.peek(); t && isSign(t, "+", "-", "−"); t = this.peek()) {
      this.next++;
      value = this.combined(t.text === "+" ? "plus" : "minus", value, this.product(), t);
    }
    return value;
  }

  end(): void {
    const t = this.peek();
    if (t) this.refuse(t, "an operator or the end");
  }

  private signed(): Exact {
    const t = this.peek();
    if (t && isSign(t, "+", "-", "−")) {
      this.next++;
      const value = this.product();
      return t.text === "+" ? value : value.neg();
    }
    return this.product();
  }

  private product(): Exact {
    let value = this.power();
    let divided = false;
    for (let t = this.peek(); t; t = this.peek()) {
      if (isSign(t, "*", "·", "×", "/")) {
        this.next++;
        divided = t.text === "/";
        value = this.combined(divided ? "div" : "times", value, this.factorAfter(t), t);
      } else if (startsFactor(t)) {
        if (divided && !t.spaced) this.ambiguous(t);
        if (t.kind === "number") this.refuse(t, "an operator between two numbers");
        value = this.combined("times", value, this.power(), t);
      } else break;
    }
    return value;
  }

  /** After an operator a sign may stand: 2*-3. */
  private factorAfter(t: Token): Exact {
    const after = this.peek();
    if (!after) return this.refuse(undefined, `a factor after ${t.text}`);
    if (isSign(after, "-", "−")) {
      this.next++;
      return this.power().neg();
    }
    return this.power();
  }

  private power(): Exact {
    const base = this.factor();
    const t = this.peek();
    if (!t || !isSign(t, "^", "**")) return base;
    this.next++;
    const minus = this.peek();
    const negative = minus !== undefined && isSign(minus, "-", "−");
    if (negative) this.next++;
    const exponent = this.group();
    const n = exponent instanceof Rational && exponent.den === 1n ? Number(exponent.num) : Number.NaN;
    const result = Math.abs(n) <= 10_000 ? power(base, negative ? -n : n) : undefined;
    return result ?? this.refuse(t, "an integer exponent that keeps the number short");
  }

  private factor(): Exact {
    const t = this.peek();
    if (!t) return this.refuse(undefined, "a number");
    this.next++;
    if (t.kind === "number") return Rational.parse(t.text.replace("−", "-"));
    if (t.kind === "value") return t.value!;
    if (t.text === "i") return Quadratic.of(0, 1, -1);
    if (t.text === "√") return this.rootOf(t, () => this.group());
    if (t.text === "\\sqrt") return this.rootOf(t, () => this.braced());
    if (t.text === "frac") return this.combined("div", this.braced(), this.braced(), t);
    if (t.text === "(") return this.closedBy(")");
    this.next--;
    return this.refuse(t, "a number, i, √ or an opening bracket");
  }

  private closedBy(bracket: string): Exact {
    const value = this.sum();
    const close = this.peek();
    if (close?.text !== bracket) return this.refuse(close, "a closing bracket");
    this.next++;
    return value;
  }

  /** A group in braces, or one digit; of more TeX itself would take the first alone. */
  private braced(): Exact {
    const t = this.peek();
    if (t?.text === "{" || (t?.kind === "number" && t.text.length === 1)) return this.group();
    return this.refuse(t, "braces");
  }

  /** A group in braces, or one factor. */
  private group(): Exact {
    if (this.peek()?.text !== "{") return this.factor();
    this.next++;
    return this.closedBy("}");
  }

  private rootOf(t: Token, argument: () => Exact): Exact {
    // A sign right after the root belongs to the radicand: √-163.
    const sign = this.peek();
    const negative = sign !== undefined && isSign(sign, "-", "−");
    if (negative) this.next++;
    const radicand = negative ? argument().neg() : argument();
    return root(radicand) ?? this.refuse(t, "the root of a rational number");
  }

  private combined(method: "plus" | "minus" | "times" | "div", x: Exact, y: Exact, t: Token): Exact {
    return combine(method, x, y) ?? this.refuse(t, "numbers of one quadratic field, not too long");
  }

  private peek(): Token | undefined {
    return this.list[this.next];
  }

  private ambiguous(t: Token): never {
    const at = offset(this.pieces, t.piece) + t.at;
    fail(
      this.subject,
      this.pieces,
      at,
      "one reading",
      `Write (1/2) ${t.text} with a space or bracket for the product, 1/(2 ${t.text}) for the quotient.`,
    );
  }

  private refuse(t: Token | undefined, expected: string): never {
    const end = this.pieces.reduce<number>((sum, p) => sum + p.toString().length, 0);
    fail(this.subject, this.pieces, t ? offset(this.pieces, t.piece) + t.at : end, expected);
  }
}

function isSign(t: Token, ...signs: readonly string[]): boolean {
  return t.kind === "sign" && signs.includes(t.text);
}

function startsFactor(t: Token): boolean {
  return t.kind !== "sign" || t.text === "(" || t.text === "√";
}
