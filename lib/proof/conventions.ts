// The conventions of edition 1, one row an item: a result names the rows that it used and the page prints them once.

/** The edition these rows belong to; a release that changes a row opens a new edition and keeps this one selectable. */
export const EDITION = 1;

export interface Convention {
  /** The item in a word or two, as a heading. */
  readonly item: string;
  /** The adopted choice as one sentence of plain text. */
  readonly text: string;
}

const ROWS = {
  cubic: {
    item: "cubic",
    text: "℘′² = 4℘³ − g2 ℘ − g3; a long model [a1, a2, a3, a4, a6] has g2 = c4/12, g3 = c6/216 and x = ℘ − b2/12",
  },
  periods: {
    item: "periods",
    text: "ω1, ω2 are full periods, Λ = Zω1 + Zω2, τ = ω2/ω1 with Im τ > 0; halves are written ω/2",
  },
  roots: {
    item: "roots",
    text: "e1 = ℘(ω1/2), e2 = ℘((ω1+ω2)/2), e3 = ℘(ω2/2); m = (e2 − e3)/(e1 − e3) and λ = θ2⁴/θ3⁴",
  },
  realBasis: {
    item: "real basis",
    text: "ω1 > 0 is the least real period and Re ω2 is 0 or ω1/2; in it Δ > 0 gives e1 > e2 > e3, and Δ < 0 gives e1 real, Im e2 > 0",
  },
  signOfPeriods: {
    item: "sign of the periods",
    text: "for a lattice that is not real, Re ω1 > 0, or Re ω1 = 0 and Im ω1 > 0",
  },
  fundamentalDomain: {
    item: "fundamental domain",
    text: "Re τ in [−1/2, 1/2), |τ| ≥ 1, and Re τ ≤ 0 where |τ| = 1",
  },
  realPeriod: {
    item: "real period",
    text: "ω1 is the least positive real period; Ω = (number of real components) × ω1 of the minimal differential",
  },
  differential: {
    item: "differential",
    text: "dz = dx/(2y + a1 x + a3), so y → −∞ as z → 0+",
  },
  quasiPeriods: {
    item: "quasi-periods",
    text: "η_k = ζ(z + ω_k) − ζ(z) for full periods, so η1 ω2 − η2 ω1 = 2πi",
  },
  discriminant: {
    item: "discriminant",
    text: "Δ = g2³ − 27 g3² = (2π/ω1)^12 η(τ)^24; the polynomial 4x³ − g2 x − g3 has discriminant 16 Δ",
  },
  j: { item: "j", text: "j = 1728 g2³/Δ, so j(i) = 1728" },
  nome: { item: "nome", text: "q_θ = exp(πiτ) and q_mod = exp(2πiτ), always named" },
  theta: {
    item: "theta",
    text: "{ v } is the argument of sin πv and { z } that of sin z; derivatives are in the named variable",
  },
  modulus: {
    item: "modulus",
    text: "parameter m = k², m1 = 1 − m; Π(n; φ | m) has the factor 1 − n sin²φ",
  },
  eisenstein: {
    item: "Eisenstein series",
    text: "G_k = Σ ω^−k over nonzero lattice points; E_k has constant term 1; G2 names its order of summation",
  },
  height: {
    item: "height",
    text: "ĥ(P) = lim h(x(nP))/n² over Q; ⟨P, Q⟩ = ½(ĥ(P+Q) − ĥ(P) − ĥ(Q))",
  },
  regulator: { item: "regulator", text: "of the subgroup that is named, unless saturation is proved" },
  modelChange: {
    item: "change of model",
    text: "x = u²x′ + r, y = u³y′ + su²x′ + t, from the old model to the new",
  },
  isogeny: {
    item: "isogeny",
    text: "normalised (pulls dz back to dz) where Λ ⊂ Λ′; another factor is printed",
  },
  weilPairing: { item: "Weil pairing", text: "e_n(ω1/n, ω2/n) = exp(2πi/n)" },
  components: {
    item: "real components",
    text: "the identity component contains O; the bounded one is z = ω2/2 + t, t real",
  },
  branch: { item: "arg, ln", text: "arg in (−π, π], the cut belongs to the upper side" },
} as const satisfies Record<string, Convention>;

export type ConventionKey = keyof typeof ROWS;

/** The row of a key, and the keys in their printed order. */
export function convention(key: ConventionKey): Convention {
  return ROWS[key];
}

/** Keys without repeats, in the order of the edition. */
export function conventionOrder(keys: Iterable<ConventionKey>): ConventionKey[] {
  const used = new Set(keys);
  return (Object.keys(ROWS) as ConventionKey[]).filter((key) => used.has(key));
}
