// Stored numbers compared as what they are: exact ones equal or not, enclosures apart or overlapping. All of it in exact
// rational arithmetic on the decimals of the file.
import { Rational } from "../../../lib/number/rational.ts";
import { type StoredDecimal, storedDecimal, storedPlace } from "../../../lib/number/stored.ts";
import { SAME, type Verdict, verdict } from "./verdict.ts";

/** A number's data: its kind and strings. */
export type NumberData = Readonly<Record<string, unknown>>;

/** The disc that a number's data stand for. */
export interface Enclosed {
  readonly re: Rational;
  readonly im: Rational;
  /** 0 for an exact value. */
  readonly radius: Rational;
}

/** Digits by which the accuracy of one value may vary from run to run: its radius is rounded, its size is counted roughly. */
const SLACK = 2;

/** A stored number with fewer digits than FEW, where ENOUGH more are proved now, is no number to compare with. */
const FEW = 3;
const ENOUGH = 7;

const ZERO = Rational.zero;
const KINDS = new Set(["rational", "quadratic", "real", "complex"]);

export function isNumberData(data: unknown): data is NumberData {
  return typeof data === "object" && data !== null && KINDS.has(String((data as NumberData).kind));
}

/**
 * Compares a stored number with a fresh one.
 *
 * `digits` is what the fresh run was asked for, if less than what is stored: an enclosure that is wider only for that
 * reason is the same. Quadratic numbers are compared exactly with each other, and by enclosures with all else.
 */
export function compareNumbers(stored: NumberData, fresh: NumberData, where: string, digits = Infinity): Verdict {
  if (sameFields(stored, fresh)) return SAME;
  // Vast and tiny numbers are compared in a unit of their own size.
  const [before, now] = enclosedTogether([stored, fresh]);
  const bothQuadratic = stored.kind === "quadratic" && fresh.kind === "quadratic";
  if (!before || !now || bothQuadratic) return verdict("differs", `${where}: was ${show(stored)}, is ${show(fresh)}`);
  if (!overlaps(before, now))
    return verdict("differs", `${where}: was ${show(stored)}, is ${show(fresh)}${relation(before, now)}`);
  const [had, has] = [accuracy(before), accuracy(now)];
  // An enclosure around a proved number that holds hardly a digit agrees with anything near: nothing was confirmed.
  if (stored.standing === "defined" && had < FEW && has >= FEW + ENOUGH)
    return verdict(
      "weaker",
      `${where}: ${has} digits are proved, the stored enclosure is so wide that it can only overlap`,
    );
  if (has >= Math.min(had, digits) - SLACK) return SAME;
  return verdict("weaker", `${where}: ${has} digits are proved, ${had} were`);
}

/** Field by field, since a file keeps them in another order than the kernel sends them. */
function sameFields(a: NumberData, b: NumberData): boolean {
  const names = Object.keys(a);
  return names.length === Object.keys(b).length && names.every((name) => a[name] === b[name]);
}

/** Decimal digits that a number's data prove, relative to its size; Infinity if it is exact. */
export function digitsOf(data: NumberData): number {
  const value = enclosed(data);
  return value ? accuracy(value) : Number.POSITIVE_INFINITY;
}

/** Numbers up to 10^±10000 are read as they are: no quadratic number is stored that is longer. */
const SHORT = 10_000;

/** The place of the leading digit of the largest part, or 0 where exact rationals are short enough. */
function unitOf(...all: readonly NumberData[]): number {
  const places = all.flatMap((data) =>
    ["value", "middle", "re", "im", "radius"].flatMap((field) =>
      data[field] === undefined ? [] : (storedPlace(String(data[field])) ?? []),
    ),
  );
  const most = Math.max(...places);
  return places.some((place) => Math.abs(place) > SHORT) && Number.isSafeInteger(most) ? most : 0;
}

/** The disc of a number's data in units of 10^unit; undefined for what is no number after all. */
export function enclosed(data: NumberData, unit = unitOf(data)): Enclosed | undefined {
  const part = (field: string) => storedDecimal(String(data[field]), unit);
  try {
    if (data.kind === "rational") return { re: part("value").value, im: ZERO, radius: part("value").cut };
    if (data.kind === "real") return around(part("middle"), { value: ZERO, cut: ZERO }, part("radius"));
    if (data.kind === "quadratic" && unit === 0)
      return enclosedQuadratic(part("a").value, part("b").value, BigInt(String(data.d)));
    if (data.kind === "complex") return around(part("re"), part("im"), part("radius"));
  } catch {
    return undefined;
  }
  return undefined;
}

/** The discs of several numbers' data in one unit. */
export function enclosedTogether(all: readonly NumberData[]): readonly (Enclosed | undefined)[] {
  const unit = unitOf(...all);
  return all.map((data) => enclosed(data, unit));
}

/** What is cut from a part far below the others goes into the radius. */
function around(re: StoredDecimal, im: StoredDecimal, radius: StoredDecimal): Enclosed {
  const cut = re.cut.plus(im.cut).plus(radius.cut);
  return { re: re.value, im: im.value, radius: radius.value.plus(cut) };
}

/** Decimals to which a root is enclosed: far more than is ever stored of a value. */
const ROOT_DIGITS = 400;

/** a + b√d, on the imaginary axis of b for negative d. */
function enclosedQuadratic(a: Rational, b: Rational, d: bigint): Enclosed {
  const scale = 10n ** BigInt(ROOT_DIGITS);
  const root = Rational.of(squareRoot((d < 0n ? -d : d) * scale * scale), scale).times(b);
  const radius = b.abs().div(Rational.of(scale));
  return d < 0n ? { re: a, im: root, radius } : { re: a.plus(root), im: ZERO, radius };
}

/** The whole part of a root, by Newton from above. */
function squareRoot(n: bigint): bigint {
  let root = 1n << BigInt((n.toString(2).length + 1) >> 1);
  for (let next = (root + n / root) >> 1n; next < root; next = (root + n / root) >> 1n) root = next;
  return root;
}

/** Can both be true of one value? Squares, since distances of rational points need not be rational. */
export function overlaps(a: Enclosed, b: Enclosed): boolean {
  const reach = a.radius.plus(b.radius);
  return distanceSquared(a, b).compare(reach.times(reach)) <= 0;
}

function distanceSquared(a: Enclosed, b: Enclosed): Rational {
  const re = a.re.minus(b.re);
  const im = a.im.minus(b.im);
  return re.times(re).plus(im.times(im));
}

/** Decimal digits of the middle that the radius leaves; Infinity if exact. */
function accuracy({ re, im, radius }: Enclosed): number {
  if (radius.num === 0n) return Infinity;
  const size = re.abs().compare(im.abs()) >= 0 ? re.abs() : im.abs();
  const ratio = size.div(radius);
  return ratio.num === 0n ? 0 : Math.max(0, decimalLength(ratio.num) - decimalLength(ratio.den));
}

function decimalLength(n: bigint): number {
  return n.toString().length;
}

/** What the eye looks for first: the other sign, the conjugate, a factor of two. */
function relation(before: Enclosed, now: Enclosed): string {
  const changes: readonly [string, (x: Enclosed) => Enclosed][] = [
    ["the sign changed", (x) => ({ ...x, re: x.re.neg(), im: x.im.neg() })],
    ["it is the complex conjugate", (x) => ({ ...x, im: x.im.neg() })],
    ["it is twice as large", (x) => scaled(x, Rational.of(2n))],
    ["it is half as large", (x) => scaled(x, Rational.of(1n, 2n))],
  ];
  const found = changes.find(([, change]) => overlaps(change(before), now));
  return found ? ` (${found[0]})` : "";
}

function scaled({ re, im, radius }: Enclosed, factor: Rational): Enclosed {
  return { re: re.times(factor), im: im.times(factor), radius: radius.times(factor) };
}

function show(data: NumberData): string {
  const short = (text: unknown) => decimalShort(String(text));
  switch (data.kind) {
    case "rational":
      return String(data.value);
    case "quadratic":
      return `${data.a} + ${data.b}√${data.d}`;
    case "real":
      return short(data.middle);
    default:
      return `${short(data.re)} + ${short(data.im)} i`;
  }
}

/** "12345e-3" as 12.345, to some twenty digits. */
function decimalShort(text: string): string {
  const match = /^(-?)(\d+)(?:e(-?\d+))?$/.exec(text);
  if (!match) return text;
  const [, sign = "", digits = "", exponent = "0"] = match;
  const point = digits.length + Number(exponent);
  if (point > 20 || point < -6) return `${sign}${digits[0]}.${digits.slice(1, 20)}e${point - 1}`;
  const padded = point <= 0 ? digits.padStart(digits.length - point + 1, "0") : digits.padEnd(point, "0");
  const whole = Math.max(point, 1);
  const fraction = padded.slice(whole, whole + 20);
  return `${sign}${padded.slice(0, whole)}${fraction ? `.${fraction}` : ""}`;
}
