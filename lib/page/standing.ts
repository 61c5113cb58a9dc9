import type { Standing } from "../proof/standing.ts";
import type { Kind } from "./kind.ts";
import { prose } from "./prose.ts";
import { texProse } from "./tex.ts";

/** The standing in one or two words. */
export function standingHead(standing: Standing): string {
  return standing.kind === "certified" ? `certified to ${standing.digits} digits` : standing.kind;
}

/** The standing with its argument, where that is short. */
export function standingBrief(standing: Standing): string {
  return standing.kind === "proved" ? `proved (${standing.argument})` : standingHead(standing);
}

/** A standing in words, the word that counts first. */
export function standingText(standing: Standing): string {
  switch (standing.kind) {
    case "proved":
      return `proved (${standing.argument})`;
    case "certified": {
      const { digits, bits, once } = standing;
      const again = once === undefined ? `, again with ${2 * bits}` : `; not repeated: ${once}`;
      return `certified to ${digits} digits (the sides agree within 10^-${digits}; computed with ${bits} bits${again})`;
    }
    case "conjectured":
      return `conjectured (${standing.evidence})`;
    case "undecided":
      return `undecided (${standing.tried})`;
    case "refuted":
      return `refuted (${standing.evidence})`;
  }
}

/** The same as running text with its powers of ten as formulas. */
export function standingProse(standing: Standing): string {
  return prose(standingText(standing));
}

/** The same as a formula. */
export function standingTex(standing: Standing): string {
  return texProse(standingProse(standing));
}

const FIELDS = {
  proved: "argument",
  certified: "digits",
  conjectured: "evidence",
  undecided: "tried",
  refuted: "evidence",
};

export function isStanding(value: object): value is Standing {
  const { kind } = value as Partial<Standing>;
  return typeof kind === "string" && Object.hasOwn(FIELDS, kind) && Object.hasOwn(value, FIELDS[kind]);
}

/** A standing by itself, such as the answer of `phi.verify()`. */
export const standingKind: Kind<Standing> = {
  text: standingText,
  tex: standingTex,
  prose: standingProse,
  data: (standing) => Object.fromEntries(Object.entries(standing).map(([key, value]) => [key, String(value)])),
};
