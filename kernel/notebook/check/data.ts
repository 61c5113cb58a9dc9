// Values as data, compared by what they mean: numbers as enclosures, claims by their standing, the rest part by part.
import { basisChange } from "./basis.ts";
import { compareNumbers, isNumberData, type NumberData } from "./number-data.ts";
import { SAME, type Verdict, verdict, worst } from "./verdict.ts";
import { brief, compareWords } from "./words.ts";

type Fields = Readonly<Record<string, unknown>>;

const STANDINGS = ["refuted", "undecided", "conjectured", "certified", "proved"];

/** Compares the data of a stored value with that of a fresh one; `digits` as in `compareNumbers`. */
export function compareData(stored: unknown, fresh: unknown, where = "value", digits = Infinity): Verdict {
  if (isNumberData(stored) && isNumberData(fresh)) return compareNumbers(stored, fresh, where, digits);
  if (Array.isArray(stored) && Array.isArray(fresh)) return compareLists(stored, fresh, where, digits);
  if (isFields(stored) && isFields(fresh)) {
    if (stored.kind === "claim" && fresh.kind === "claim") return compareClaims(stored, fresh, where, digits);
    return namedBasis(stored, fresh, compareFields(stored, fresh, where, digits));
  }
  if (typeof stored === "string" && typeof fresh === "string") return compareWords(stored, fresh, where, digits);
  if (stored === fresh) return SAME;
  return verdict("differs", `${where}: was ${brief(stored)}, is ${brief(fresh)}`);
}

function isFields(value: unknown): value is Fields {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}

function compareLists(stored: readonly unknown[], fresh: readonly unknown[], where: string, digits: number): Verdict {
  if (stored.length !== fresh.length) {
    return verdict("differs", `${where}: had ${stored.length} entries, has ${fresh.length}`);
  }
  const parts = stored.map((one, index) => compareData(one, fresh[index], `${where}[${index}]`, digits));
  const whole = worst(parts);
  if (whole.finding !== "differs") return whole;
  return isReordered(stored, fresh, digits) ? verdict("differs", `${where}: the same values in another order`) : whole;
}

/** Is the fresh list a rearrangement of the stored one? Lists are short: periods, roots, points. */
function isReordered(stored: readonly unknown[], fresh: readonly unknown[], digits: number): boolean {
  if (stored.length > 64) return false;
  const left = [...fresh];
  return stored.every((one) => {
    const at = left.findIndex((other) => compareData(one, other, "", digits).finding === "same");
    if (at >= 0) left.splice(at, 1);
    return at >= 0;
  });
}

/** Adds to different periods that they span the same lattice, if they do. */
function namedBasis(stored: Fields, fresh: Fields, found: Verdict): Verdict {
  if (found.finding !== "differs" || !Array.isArray(stored.periods) || !Array.isArray(fresh.periods)) return found;
  const change = basisChange(stored.periods.map(numberOf), fresh.periods.map(numberOf));
  return change === undefined ? found : { ...found, notes: [change, ...found.notes] };
}

/** The number in a point of a torus, which is its value. */
function numberOf(data: unknown): NumberData {
  return isFields(data) && isNumberData(data.value) ? data.value : (data as NumberData);
}

function compareFields(stored: Fields, fresh: Fields, where: string, digits: number): Verdict {
  const names = [...new Set([...Object.keys(stored), ...Object.keys(fresh)])];
  const at = typeof stored.kind === "string" && where === "value" ? stored.kind : where;
  return worst(names.map((name) => compareData(stored[name], fresh[name], `${at}.${name}`, digits)));
}

/** A claim keeps or improves its standing; digits certified may not fall, unless fewer were asked for. */
function compareClaims(stored: Fields, fresh: Fields, where: string, digits: number): Verdict {
  const name = `claim "${String(fresh.name)}"`;
  const { standing: before, ...statement } = stored;
  const { standing: now, ...restated } = fresh;
  return worst([
    compareFields(statement, restated, where === "value" ? name : where, digits),
    compareStandings(isFields(before) ? before : {}, isFields(now) ? now : {}, name, digits),
  ]);
}

function compareStandings(before: Fields, now: Fields, name: string, digits: number): Verdict {
  const [had, has] = [STANDINGS.indexOf(String(before.kind)), STANDINGS.indexOf(String(now.kind))];
  if (now.kind === "refuted" && before.kind !== "refuted") {
    return verdict("differs", `${name}: was ${before.kind}, is refuted (${String(now.evidence)})`);
  }
  if (has < had) return verdict("weaker", `${name}: was ${before.kind}, is ${now.kind}`);
  const [certified, certifies] = [Number(before.digits), Number(now.digits)];
  if (has === had && now.kind === "certified" && certifies < Math.min(certified, digits) - 1) {
    return verdict("weaker", `${name}: was certified to ${certified} digits, is to ${certifies}`);
  }
  return SAME;
}
