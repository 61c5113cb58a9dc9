// The refusal of a singular plane cubic: where, of what kind, which lines it holds, and the group of the smooth part.

import { squarefreePart } from "../algebra/factor.ts";
import type { Field } from "../algebra/field.ts";
import type { Polynomial } from "../algebra/multivariate.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { plainPolynomial } from "../curve/equation/print.ts";
import { cubicC4C6, cubicInvariants, discriminantTimes1728 } from "../curve/map/invariants.ts";
import { isThreeLines, rationalLines, rationalSingularPoints, type SingularPoint } from "../curve/map/singularcubic.ts";
import type { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";

/** Throws DomainError for a singular plane cubic; over Q with its singular points. Domain: characteristic not 2 or 3. */
export function requireSmooth<T>(F: Field<T>, form: Polynomial<T>): void {
  const lines = isThreeLines(F, form);
  const invariants = lines ? undefined : cubicInvariants(F, form);
  const [c4, c6] = invariants ? cubicC4C6(F, invariants) : [F.zero, F.zero];
  if (invariants && !F.isZero(discriminantTimes1728(F, c4, c6))) return;
  if (F.name === "Q") throw singularCubic(form as unknown as Polynomial<Rational>, lines);
  throw new DomainError({
    subject: "cubic",
    given: `${plainPolynomial(F, form)} = 0 over ${F.name} is ${lines ? "three lines over some field" : "singular"}`,
    expected: "a nonsingular cubic",
    hint: "A singular cubic is no curve of genus 1.",
    argument: "equation",
  });
}

const KINDS = {
  "split node": "a node with rational tangents (split)",
  "nonsplit node": "a node with conjugate tangents (nonsplit)",
  cusp: "a cusp",
  tacnode: "a point with one tangent",
  "triple point": "a triple point",
} as const;

function singularCubic(form: Polynomial<Rational>, threeLines: boolean): DomainError {
  const lines = rationalLines(form);
  const points = rationalSingularPoints(form);
  const reducible = lines.length > 0 || threeLines;
  const named = points.map(
    ({ point, kind }) => `(${point.join(" : ")}), ${KINDS[reducible && kind === "cusp" ? "tacnode" : kind]}`,
  );
  const where = named.length > 0 ? `at ${named.join("; ")}` : "at points that are conjugate over Q";
  return new DomainError({
    subject: "cubic",
    given: `${plainPolynomial(Q, form)} = 0 is singular ${where}`,
    expected: "a nonsingular cubic",
    hint: `A singular cubic is no curve of genus 1. ${reducible ? components(lines, threeLines) : smoothPart(points)}`.trim(),
    argument: "equation",
  });
}

/** "It contains the line x + y = 0." */
function components(lines: readonly Polynomial<Rational>[], threeLines: boolean): string {
  const named = lines.map((f) => `${plainPolynomial(Q, f)} = 0`);
  const own = named.length > 0 ? `It contains the ${named.length > 1 ? "lines" : "line"} ${named.join(" and ")}` : "";
  const all = "It is a product of three lines over some field";
  if (threeLines) return named.length === 3 ? `${own}.` : `${own ? `${own}. ` : ""}${all}.`;
  return `${own}; the rest is a conic.`;
}

/** The group of the smooth points of an irreducible cubic, once one of them is chosen as O: lines through the double point parametrise it. */
function smoothPart(points: readonly SingularPoint[]): string {
  const [only] = points;
  if (!only) return "";
  const group =
    only.kind === "cusp"
      ? "the additive group of Q"
      : only.kind === "split node"
        ? "the multiplicative group of Q"
        : `the group of elements of norm 1 in Q(√${squarefreePart(only.tangents.num * only.tangents.den)})`;
  return `Its smooth part, with one of its points as O, is ${group}.`;
}
