import { unpack } from "../algebra/multivariate.ts";
import { type Equation, leadingSide, plainPolynomial } from "../curve/equation/print.ts";
import type { Standing } from "../proof/standing.ts";
import type { Curve } from "../surface/curve.ts";
import type { EndomorphismRing } from "../surface/endomorphisms.ts";
import type { Point } from "../surface/point.ts";
import type { PointRelations } from "../surface/relations.ts";
import type { Kind, Show } from "./kind.ts";
import { elementTex, equationTex, fieldTex } from "./polynomial-tex.ts";
import { array, small, texName, texWords } from "./tex.ts";

export const curveKind: Kind<Curve<unknown>> = {
  text: (E) => `${E}${givenText(E)}${E.notice ? `\n  ${E.notice}` : ""}`,
  tex: (E, show) => {
    const equation = `${equationTex(E.field, E.equation, show)} \\quad \\text{over } ${fieldTex(E.field.name)}`;
    const line = `${equation}${givenTex(E, show)}`;
    return E.notice ? array("l", [[line], [small(texWords(E.notice))]]) : line;
  },
  data: (E) => E.toJSON() as { kind: string },
};

/** ", given as y^2 = 4*x^3 - 4*x + 1, whose y is 2*y here" */
function givenText(E: Curve<unknown>): string {
  if (!E.given) return "";
  const F = E.field;
  const { left, right } = splitAt(E);
  const scales = scaled(E).map(({ from, factor, to }) => `whose ${from} is ${F.format(factor)}*${to} here`);
  return [`, given as ${plainPolynomial(F, left, leadingSide(left))} = ${plainPolynomial(F, right)}`, ...scales].join(
    ", ",
  );
}

function givenTex(E: Curve<unknown>, show: Show): string {
  if (!E.given) return "";
  const equation = equationTex(E.field, splitAt(E), show);
  const scales = scaled(E).map(
    ({ from, factor, to }) =>
      `\\text{ whose } ${texName(from)} \\text{ is } ${elementTex(E.field, factor, show)}\\,${to} \\text{ here}`,
  );
  return [`, \\quad \\text{given as } ${equation}`, ...scales].join(",");
}

/** The given equation with the terms in y on the left. */
function splitAt(E: Curve<unknown>): Equation<unknown> {
  const { polynomial, letters } = E.given!;
  const { variables, terms } = polynomial;
  const y = variables.indexOf(letters[1]);
  const isLeft = (key: number): boolean => unpack(key, variables.length)[y] !== 0;
  const left = [...terms].filter(([key]) => isLeft(key));
  const right = [...terms].filter(([key]) => !isLeft(key)).map(([key, c]): [number, unknown] => [key, E.field.neg(c)]);
  return { left: { variables, terms: new Map(left) }, right: { variables, terms: new Map(right) } };
}

function scaled(E: Curve<unknown>): { from: string; factor: unknown; to: string }[] {
  const { letters, scaleX, scaleY } = E.given!;
  const all = [
    { from: letters[0], factor: scaleX, to: "x" },
    { from: letters[1], factor: scaleY, to: "y" },
  ];
  return all.filter(({ factor }) => E.field.format(factor) !== "1");
}

export const pointKind: Kind<Point<unknown>> = {
  text: (P) => String(P),
  tex: (P, show) => {
    if (!P.coordinates) return "O";
    const parts = P.coordinates.map((c) => elementTex(P.curve.field, c, show));
    return `\\left( ${parts.join(",\\; ")} \\right)`;
  },
  data: (P) => ({ kind: "point", curve: P.curve.toJSON().a, coordinates: P.toJSON().coordinates }),
};

export const endomorphismKind: Kind<EndomorphismRing> = {
  text: (ring) => String(ring),
  tex: (ring) => texWords(String(ring)),
  data: (ring) => ring.toJSON(),
};

export const relationsKind: Kind<PointRelations> = {
  text: (relations) => `${relations}\n  ${relations.standing.kind}: ${argumentOf(relations.standing)}`,
  tex: (relations) =>
    array("l", [[texWords(String(relations))], [small(texWords(`proved: ${argumentOf(relations.standing)}`))]]),
  data: (relations) => relations.toJSON(),
};

function argumentOf(standing: Standing): string {
  return standing.kind === "proved" ? standing.argument : "";
}
