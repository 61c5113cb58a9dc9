// Laurent expansions of elliptic functions, homotheties, and complex multiplication.

import type { ComplexMultiplication } from "../surface/complex-multiplication.ts";
import type { Homothety } from "../surface/homothety.ts";
import type { LaurentExpansion } from "../surface/laurent-expansion.ts";
import type { AlgebraicRelation } from "../surface/relation.ts";
import type { SecondRoute } from "../surface/second-route.ts";
import type { Kind, Show } from "./kind.ts";
import { prose } from "./prose.ts";
import { standingProse, standingText } from "./standing.ts";
import { array, texProse, texWords } from "./tex.ts";

const MOST_TERMS = 12;

export const laurentKind: Kind<LaurentExpansion> = {
  text: (series) => `${series}, t = z${atText(series)}`,
  tex: (series, show) => {
    const terms = series.coefficients
      .map((c, k) => ({ tex: show.tex(c), exponent: series.order + k }))
      .filter(({ tex }) => tex !== "0");
    const shown = terms.slice(0, MOST_TERMS).map(({ tex, exponent }) => termTex(tex, exponent));
    const end = series.order + series.coefficients.length;
    const rest = end === 0 ? "O(1)" : end === 1 ? "O(t)" : `O(t^{${end}})`;
    const long = shown.some((term) => term.length > 60);
    const where = `\\quad t = z ${atTex(series, show)}`;
    if (long)
      return array("l", [...shown.map((term, k) => [k === 0 ? term : `{}+ ${term}`]), [`{}+ ${rest}, ${where}`]]);
    return `${[...shown, rest].join(" + ").replaceAll("+ -", "- ")}, ${where}`;
  },
  data: (series, show) => ({
    kind: "expansion",
    order: String(series.order),
    coefficients: series.coefficients.map((c) => show.data(c)),
  }),
};

function termTex(coefficient: string, exponent: number): string {
  const power = exponent === 0 ? "" : exponent === 1 ? "t" : `t^{${exponent}}`;
  if (power === "") return coefficient;
  if (coefficient === "1" || coefficient === "-1") return `${coefficient.slice(0, -1)}${power}`;
  return /[^\\{]\s[+-]\s/.test(coefficient) ? `\\left(${coefficient}\\right) ${power}` : `${coefficient}\\, ${power}`;
}

function atText({ point }: LaurentExpansion): string {
  return isOrigin(point) ? "" : ` - (${String(point).split(" = ")[0]})`;
}

function atTex({ point }: LaurentExpansion, show: Show): string {
  if (isOrigin(point)) return "";
  const [name = ""] = show.tex(point).split(" = ");
  return `- ${/\s[+-]\s/.test(name) ? `\\left(${name}\\right)` : name}`;
}

function isOrigin(point: LaurentExpansion["point"]): boolean {
  return point.exact !== undefined && String(point.exact) === "0";
}

export const homothetyKind: Kind<Homothety> = {
  text: (h) => `${h}   ${standingText(h.standing)}`,
  tex: (h, show) => `\\Lambda_2 = \\alpha\\, \\Lambda_1, \\quad \\alpha = ${show.tex(h.factor)}`,
  prose: (h, show) =>
    `$\\displaystyle \\Lambda_2 = \\alpha\\, \\Lambda_1, \\quad \\alpha = ${show.tex(h.factor)}$ — ${standingProse(h.standing)}`,
  data: (h, show) => ({ kind: "homothety", factor: show.data(h.factor), standing: h.standing.kind }),
};

/** A sentence with its reason; its standing is part of it. */
export const multiplicationKind: Kind<ComplexMultiplication> = {
  text: (cm) => String(cm),
  // The reason stands below, where both do not fit on a line.
  tex: (cm) => {
    const [head = "", ...reason] = String(cm).split(/(?<=:) /);
    const words = [head, reason.join(" ")].filter((line) => line !== "").map((line) => texProse(prose(line)));
    return String(cm).length > 60
      ? array(
          "l",
          words.map((line) => [line]),
        )
      : words.join("\\;");
  },
  prose: (cm) => prose(String(cm)),
  // What a claim compares: the discriminant where there is one, else whether there is any.
  short: ({ discriminant }) => {
    const words = discriminant === undefined ? "complex multiplication" : "discriminant of complex multiplication";
    return { text: words, tex: texWords(words) };
  },
  data: (cm) => ({
    kind: "complex multiplication",
    outcome: cm.outcome,
    discriminant: cm.discriminant === undefined ? null : String(cm.discriminant),
  }),
};

/** Both values under each other, with their agreement. */
export const secondRouteKind: Kind<SecondRoute> = {
  text: (pair) => String(pair),
  tex: (pair, show) =>
    array("ll", [
      [show.tex(pair.value), `\\text{${pair.operation}}`],
      [show.tex(pair.other), `\\text{${pair.route}}`],
      [pair.agree ? `\\text{agree within } 10^{${-pair.digits!}}` : "\\text{do not meet}", ""],
    ]),
  data: (pair, show) => ({
    kind: "second route",
    route: pair.route,
    value: show.data(pair.value),
    other: show.data(pair.other),
    standing: pair.standing.kind,
  }),
};

/** F(X, Y) = 0 with what X and Y are, and its standing. */
export const relationKind: Kind<AlgebraicRelation> = {
  text: (relation) => `${relation}, X = ${relation.first}, Y = ${relation.second}   ${standingText(relation.standing)}`,
  tex: (relation) =>
    `${relationTex(String(relation))}, \\quad X = ${relationTex(String(relation.first))}, \\; Y = ${relationTex(String(relation.second))}`,
  data: (relation) => ({ kind: "relation", formula: String(relation) }),
};

function relationTex(text: string): string {
  const digits = "⁰¹²³⁴⁵⁶⁷⁸⁹";
  return text
    .replace(new RegExp(`[${digits}]+`, "g"), (raised) => `^{${[...raised].map((d) => digits.indexOf(d)).join("")}}`)
    .replaceAll("℘", "\\wp")
    .replaceAll("′", "'")
    .replaceAll("·", "\\,")
    .replaceAll("−", "-");
}
