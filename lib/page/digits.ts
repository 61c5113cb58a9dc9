// Digits on a page: how a printed number is grouped, broken over lines and aligned. What the digits are is decided
// where numbers are printed; here is typesetting only.

/** A decimal number taken apart. */
export interface Decimal {
  readonly negative: boolean;
  readonly integer: string;
  /** Digits behind the point, possibly none. */
  readonly fraction: string;
  /** Power of ten the number is multiplied by, 0 if there is none. */
  readonly exponent: number;
  /** True: more digits can be asked for, shown by dots. */
  readonly continues: boolean;
  /** Radius of a measured number, such as "1e-6". */
  readonly radius?: string;
}

/** Takes text such as -12.5e-30 apart; undefined if it is no decimal number. */
export function parseDecimal(text: string): Decimal | undefined {
  const match = /^([-−]?)(\d+)(?:\.(\d*))?(\.\.\.)?(?:e([+-]?\d+))?(\.\.\.)?(?: ?± ?(\S+))?$/.exec(text.trim());
  if (!match) return undefined;
  const [, sign = "", integer = "", fraction = "", dots, exponent = "0", lateDots, radius] = match;
  return {
    negative: sign !== "",
    integer,
    fraction,
    exponent: Number(exponent),
    continues: dots !== undefined || lateDots !== undefined,
    ...(radius === undefined ? {} : { radius }),
  };
}

/** Groups of five behind the point, as tables of functions have them. */
export function fractionGroups(fraction: string): string[] {
  return fraction.length <= 5 ? (fraction === "" ? [] : [fraction]) : (fraction.match(/.{1,5}/g) ?? []);
}

/** Groups of three before the point; four digits stand together. */
export function integerGroups(integer: string): string[] {
  if (integer.length <= 4) return [integer];
  const first = integer.length % 3;
  const rest = integer.slice(first).match(/.{3}/g) ?? [];
  return first === 0 ? rest : [integer.slice(0, first), ...rest];
}

/** Groups a line may hold: about a page width; a few more are better than a short last line. */
const GROUPS_A_LINE = 10;
const MOST_GROUPS = 12;

/** Groups in lines of at most `width`, a little less where the last line would be short. */
export function inLines(groups: readonly string[], width: number): string[][] {
  if (groups.length <= width) return [[...groups]];
  const short = (w: number): boolean => groups.length % w !== 0 && groups.length % w < 3;
  let each = width;
  while (short(each) && each > Math.max(3, width - 3)) each--;
  if (short(each)) each = width;
  return Array.from({ length: Math.ceil(groups.length / each) }, (_, k) => groups.slice(k * each, (k + 1) * each));
}

/** A whole number for TeX, broken over lines where it is longer than a page is wide. */
export function texInteger(text: string): string {
  const negative = /^[-−]/.test(text);
  const groups = integerGroups(text.replace(/^[-−]/, ""));
  return lines(`${negative ? "-" : ""}`, groups, 20);
}

/**
 * The number for TeX: groups set off by thin spaces, lines of about fifty digits, the exponent as a power of ten. `sign` stands in
 * place of the number's own.
 */
export function texDecimal(
  decimal: Decimal,
  groupsALine?: number | undefined,
  sign = decimal.negative ? "-" : "",
): string {
  const head = `${sign}${integerGroups(decimal.integer).join("\\,")}`;
  const groups = fractionGroups(decimal.fraction);
  const dots = decimal.continues ? "\\ldots" : "";
  const power = decimal.exponent === 0 ? "" : ` \\cdot 10^{${decimal.exponent}}`;
  const radius = decimal.radius === undefined ? "" : ` \\pm ${texRadius(decimal.radius)}`;
  const last = groups.length === 0 ? `${head}${dots}` : `${groups[groups.length - 1]}${dots}`;
  const body = groups.length === 0 ? last : lines(`${head}.`, [...groups.slice(0, -1), last], groupsALine);
  return `${body}${power}${radius}`;
}

/** The number on one line of TeX, however long. */
export function texDecimalLine(decimal: Decimal): string {
  return texDecimal(decimal, Number.POSITIVE_INFINITY);
}

/** The number as text, ungrouped: it can be read back. */
export function plainDecimal(decimal: Decimal): string {
  const { negative, integer, fraction, exponent, continues, radius } = decimal;
  const digits = `${negative ? "-" : ""}${integer}${fraction === "" ? "" : `.${fraction}`}${continues ? "..." : ""}`;
  return `${digits}${exponent === 0 ? "" : `e${exponent}`}${radius === undefined ? "" : ` ± ${radius}`}`;
}

function texRadius(radius: string): string {
  const match = /^([\d.]+)e([+-]?\d+)$/.exec(radius);
  if (!match) return radius;
  const power = `10^{${Number(match[2])}}`;
  return match[1] === "1" ? power : `${match[1]} \\cdot ${power}`;
}

function lines(head: string, groups: readonly string[], width: number | undefined): string {
  const rows = inLines(groups, width ?? (groups.length <= MOST_GROUPS ? MOST_GROUPS : GROUPS_A_LINE));
  const set = rows.map((row, k) => `${k === 0 ? head : `\\phantom{${head}}`}${row.join("\\,")}`);
  return set.length === 1 ? set.join("") : `\\begin{array}{l} ${set.join(" \\\\ ")} \\end{array}`;
}

/** At most `digits` significant digits; what is cut off is within one unit of the last digit kept, and shown by dots. */
export function shortened(decimal: Decimal, digits: number): Decimal {
  const leadingZeros = decimal.integer === "0" ? (/^0*/.exec(decimal.fraction)?.[0].length ?? 0) : 0;
  const room = decimal.integer === "0" ? digits + leadingZeros : Math.max(0, digits - decimal.integer.length);
  if (decimal.fraction.length <= room || decimal.radius !== undefined) return decimal;
  return { ...decimal, fraction: decimal.fraction.slice(0, room), continues: true };
}
