// Plane cubics, quartics, their points, lines and forms.

import type { Polynomial } from "../algebra/multivariate.ts";
import { plainPolynomial } from "../curve/equation/print.ts";
import { QuadricPair } from "../surface/quadrics.ts";
import type { PlaneCurve, PlanePoint } from "../surface/variety.ts";
import type { Kind } from "./kind.ts";
import { type Coefficients, elementTex, fieldTex, polynomialTex } from "./polynomial-tex.ts";
import { array } from "./tex.ts";

export const planeCurveKind: Kind<PlaneCurve<unknown>> = {
  text: (C) => String(C),
  tex: (C, show) => {
    if (C instanceof QuadricPair) {
      const lines = C.polynomials.map((f) => [`${polynomialTex(C.field, f, show)} = 0`]);
      return `${array("l", lines)} \\quad \\text{over } ${fieldTex(C.field.name)}`;
    }
    const { left, right } = C.equation;
    const equation = `${polynomialTex(C.field, left, show)} = ${polynomialTex(C.field, right, show)}`;
    return `${equation} \\quad \\text{over } ${fieldTex(C.field.name)}`;
  },
  data: (C) => ({ kind: "plane curve", equation: String(C) }),
};

export const planePointKind: Kind<PlanePoint<unknown>> = {
  text: (P) => String(P),
  tex: (P, show) => {
    const F = P.curve.field;
    const { affine } = P;
    if (affine)
      return `\\left( ${P.curve.letters.map((name) => elementTex(F, affine[name], show)).join(",\\; ")} \\right)`;
    return `\\left( ${P.coordinates.map((c) => elementTex(F, c, show)).join(" : ")} \\right)`;
  },
  data: (P) => P.toJSON() as { kind: string },
};

/** Elements of any of our fields by themselves: each class of numbers prints and negates itself. */
const ANY: Coefficients<unknown> & { isZero(c: unknown): boolean } = {
  format: (c) => String(c),
  neg: (c) => (typeof c === "bigint" ? -c : (c as { neg(): unknown }).neg()),
  isZero: (c) => String(c) === "0",
};

export function isPolynomial(value: object): value is Polynomial<unknown> {
  const { variables, terms } = value as Partial<Polynomial<unknown>>;
  return Array.isArray(variables) && terms instanceof Map;
}

/** A polynomial as data, such as the form of a line. */
export const polynomialKind: Kind<Polynomial<unknown>> = {
  text: (f) => plainPolynomial(ANY as Parameters<typeof plainPolynomial>[0], f),
  tex: (f, show) => polynomialTex(ANY, f, show),
  data: (f) => ({ kind: "polynomial", value: plainPolynomial(ANY as Parameters<typeof plainPolynomial>[0], f) }),
};
