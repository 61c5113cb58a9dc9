// What the operations of a record are called in a derivation: their words, their formula with the numbers put in, and its source.

/** Operands as TeX: a number, or the place of the step that made it; undefined for data that no formula shows. */
export type Operands = readonly (string | undefined)[];

export interface Named {
  readonly words: string;
  readonly source?: string;
  formula(operands: Operands): string;
}

const of = (name: string, ...parts: Operands): string =>
  `${name}\\left(${parts.filter((part) => part !== undefined).join(", ")}\\right)`;
const amplitude = (name: string, [phi, m]: Operands): string => `${name}\\left(${phi} \\,|\\, ${m}\\right)`;
const carlsonOf = (name: string, integrand: string) => (operands: Operands) =>
  `${of(`R_${name}`, ...operands)} = ${integrand}`;

/** The functions that a reader wants to see defined; the others are shown by their name and operands. */
export const NAMED: Readonly<Record<string, Named>> = {
  "complete K": {
    words: "the complete integral of the first kind by an arithmetic-geometric mean, $m_1 = 1 - m$",
    source: "DLMF 19.8.5",
    formula: ([m, m1]) => `K(${m}) = \\frac{\\pi}{2\\, ${of("M", "1", `\\sqrt{${m1}}`)}}`,
  },
  "complete E": {
    words: "the complete integral of the second kind, $m_1 = 1 - m$",
    source: "DLMF 19.2.8, 19.25.1",
    formula: ([m, m1]) =>
      `E(${m}) = \\int_0^{\\pi/2} \\sqrt{1 - m \\sin^2\\theta}\\, d\\theta = 2 ${of("R_G", "0", m1, "1")}`,
  },
  "complete D": {
    words: "the complete integral $D = (K - E)/m$",
    source: "DLMF 19.25.1",
    formula: ([m, m1]) => `D(${m}) = \\tfrac13 ${of("R_D", "0", m1, "1")}`,
  },
  "complete Π": {
    words: "the complete integral of the third kind",
    source: "DLMF 19.2.8, 19.25.2",
    formula: ([n, , m]) =>
      `\\Pi\\left(${n} \\,|\\, ${m}\\right) = \\int_0^{\\pi/2} \\frac{d\\theta}{(1 - n \\sin^2\\theta) \\sqrt{1 - m \\sin^2\\theta}}`,
  },
  "incomplete F": {
    words: "the incomplete integral of the first kind by Carlson's $R_F$",
    source: "DLMF 19.2.4, 19.25.5",
    formula: (operands) =>
      `${amplitude("F", operands)} = \\int_0^\\varphi \\frac{d\\theta}{\\sqrt{1 - m \\sin^2\\theta}} = \\sin\\varphi\\; R_F(\\cos^2\\varphi, 1 - m \\sin^2\\varphi, 1)`,
  },
  "incomplete E": {
    words: "the incomplete integral of the second kind",
    source: "DLMF 19.2.5, 19.25.9",
    formula: (operands) => `${amplitude("E", operands)} = \\int_0^\\varphi \\sqrt{1 - m \\sin^2\\theta}\\, d\\theta`,
  },
  "incomplete Π": {
    words: "the incomplete integral of the third kind",
    source: "DLMF 19.2.7, 19.25.14",
    formula: ([n, , phi, m]) =>
      `\\Pi\\left(${n}; ${phi} \\,|\\, ${m}\\right) = \\int_0^\\varphi \\frac{d\\theta}{(1 - n \\sin^2\\theta) \\sqrt{1 - m \\sin^2\\theta}}`,
  },
  RF: {
    words: "Carlson's integral $R_F$ by duplication",
    source: "DLMF 19.16.1, 19.36(i)",
    formula: carlsonOf("F", "\\frac12 \\int_0^\\infty \\frac{dt}{\\sqrt{(t+x)(t+y)(t+z)}}"),
  },
  RC: {
    words: "Carlson's integral $R_C$",
    source: "DLMF 19.16.6",
    formula: carlsonOf("C", "\\frac12 \\int_0^\\infty \\frac{dt}{(t+y) \\sqrt{t+x}}"),
  },
  RD: {
    words: "Carlson's integral $R_D$ by duplication",
    source: "DLMF 19.16.5, 19.36(i)",
    formula: carlsonOf("D", "\\frac32 \\int_0^\\infty \\frac{dt}{(t+z) \\sqrt{(t+x)(t+y)(t+z)}}"),
  },
  RJ: {
    words: "Carlson's integral $R_J$ by duplication",
    source: "DLMF 19.16.2, 19.36(i)",
    formula: carlsonOf("J", "\\frac32 \\int_0^\\infty \\frac{dt}{(t+p) \\sqrt{(t+x)(t+y)(t+z)}}"),
  },
  RG: {
    words: "Carlson's integral $R_G$",
    source: "DLMF 19.16.3",
    formula: carlsonOf(
      "G",
      "\\frac14 \\int_0^\\infty \\frac{t}{\\sqrt{(t+x)(t+y)(t+z)}} \\left(\\frac{x}{t+x} + \\frac{y}{t+y} + \\frac{z}{t+z}\\right) dt",
    ),
  },
  agm: {
    words: "the arithmetic-geometric mean, the limit of $a_{n+1} = (a_n + b_n)/2$ and $b_{n+1} = \\sqrt{a_n b_n}$",
    source: "DLMF 19.8(i)",
    formula: (operands) => of("M", ...operands),
  },
  sn: {
    words: "Jacobi's sn by theta quotients",
    source: "DLMF 22.2.4",
    formula: (o) => amplitude("\\operatorname{sn}", o),
  },
  cn: {
    words: "Jacobi's cn by theta quotients",
    source: "DLMF 22.2.5",
    formula: (o) => amplitude("\\operatorname{cn}", o),
  },
  dn: {
    words: "Jacobi's dn by theta quotients",
    source: "DLMF 22.2.6",
    formula: (o) => amplitude("\\operatorname{dn}", o),
  },
  "elliptic logarithm": {
    words: "the inverse of $\\wp$ by Carlson's integral, the representative and the sign of $\\wp'$ chosen afterwards",
    source: "DLMF 19.25.35",
    formula: ([, w]) => `\\wp^{-1}(${w}) = R_F(${w} - e_1, ${w} - e_2, ${w} - e_3)`,
  },
  "Dedekind eta": {
    words: "Dedekind's η, with $q = \\exp(2\\pi i\\tau)$",
    source: "DLMF 23.15.9",
    formula: ([tau]) => `\\eta(${tau}) = q^{1/24} \\sum_n (-1)^n q^{n(3n-1)/2}`,
  },
  area: {
    words: "the area of a cell of the lattice",
    formula: () => "\\operatorname{Im}(\\overline{\\omega_1}\\, \\omega_2)",
  },
  zero: {
    words:
      "the one zero in the interval: the signs at its ends differ, and between them the derivative does not vanish",
    formula: () => "x",
  },
};
