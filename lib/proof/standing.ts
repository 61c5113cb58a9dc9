// How a statement is known, and how the standing of a conjunction follows from its parts.

export type Standing =
  /** By an exact argument, which is named. */
  | { readonly kind: "proved"; readonly argument: string }
  /** Enclosures agree within 10^-digits; computed with `bits` and again with twice as many, unless `once` says why not. */
  | { readonly kind: "certified"; readonly digits: number; readonly bits: number; readonly once?: string }
  /** Recognised from digits, with the evidence in words. */
  | { readonly kind: "conjectured"; readonly evidence: string }
  | { readonly kind: "undecided"; readonly tried: string }
  /** Shown false, with what shows it. */
  | { readonly kind: "refuted"; readonly evidence: string };

const ORDER = ["proved", "certified", "conjectured", "undecided"] as const;

/**
 * Standing of a conjunction: refuted if any part is refuted, else the weakest part (of two certified ones, the one
 * with fewer digits). The empty conjunction is proved.
 */
export function weakest(parts: readonly Standing[]): Standing {
  const refuted = parts.find((part) => part.kind === "refuted");
  if (refuted) return refuted;
  return parts.reduce<Standing>((low, part) => (weaker(part, low) ? part : low), {
    kind: "proved",
    argument: "empty conjunction",
  });
}

function weaker(a: Standing, b: Standing): boolean {
  if (a.kind === "certified" && b.kind === "certified") return a.digits < b.digits;
  return ORDER.indexOf(a.kind as (typeof ORDER)[number]) > ORDER.indexOf(b.kind as (typeof ORDER)[number]);
}
