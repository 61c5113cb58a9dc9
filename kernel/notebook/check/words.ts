// Words of a value's data that hold decimals, such as the label of a point in a figure: the words are compared as they
// stand, decimals that go on ("1.25...") as what they enclose.
import { compareNumbers, type NumberData } from "./number-data.ts";
import { SAME, type Verdict, verdict, worst } from "./verdict.ts";

const NUMBER = /-?\d+(?:\.\d+)?(?:\.\.\.)?(?:e-?\d+)?/g;
const COUNT_OF_DIGITS = /^ digits\b/;

/** Compares two texts; `digits` as in `compareNumbers`. */
export function compareWords(stored: string, fresh: string, where: string, digits: number): Verdict {
  if (stored === fresh) return SAME;
  const [before, now] = [apart(stored), apart(fresh)];
  const differs = verdict("differs", `${where}: was ${brief(stored)}, is ${brief(fresh)}`);
  if (before.words.join("#") !== now.words.join("#")) return differs;
  const found = worst(
    before.numbers.map((number, index) => {
      const again = now.numbers[index] ?? "";
      const counts = COUNT_OF_DIGITS.test(before.words[index + 1] ?? "");
      return counts ? compareCounts(number, again, where, digits) : compareDecimals(number, again, where, digits);
    }),
  );
  return found.finding === "differs" ? differs : found;
}

function apart(text: string): { readonly words: string[]; readonly numbers: string[] } {
  return { words: text.split(NUMBER), numbers: text.match(NUMBER) ?? [] };
}

/** "certified to 50 digits": as many as before, or as many as were asked for. */
function compareCounts(before: string, now: string, where: string, digits: number): Verdict {
  if (Number(now) >= Math.min(Number(before), digits)) return SAME;
  return verdict("weaker", `${where}: ${now} digits, ${before} before`);
}

function compareDecimals(before: string, now: string, where: string, digits: number): Verdict {
  if (before === now) return SAME;
  return compareNumbers(decimalData(before), decimalData(now), where, digits);
}

/** A printed decimal as data: with dots it is right to one unit of its last place, without it is exact. */
function decimalData(text: string): NumberData {
  const [, sign = "", whole = "", fraction = "", dots, exponent = "0"] =
    /^(-?)(\d+)(?:\.(\d+))?(\.\.\.)?(?:e(-?\d+))?$/.exec(text) ?? [];
  const unit = `e${Number(exponent) - fraction.length}`;
  return { kind: "real", middle: `${sign}${whole}${fraction}${unit}`, radius: dots ? `1${unit}` : "0" };
}

export function brief(value: unknown): string {
  const text = value === undefined ? "nothing" : typeof value === "string" ? value : JSON.stringify(value);
  return text.length > 60 ? `${text.slice(0, 57)}...` : text;
}
