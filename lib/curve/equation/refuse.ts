// Why an equation is no long Weierstrass form, in words a user can act on.

import type { Field } from "../../algebra/field.ts";
import { degree, degreeIn, homogenise, isHomogeneous, type Polynomial } from "../../algebra/multivariate.ts";
import { rationals } from "../../algebra/rationals.ts";
import type { Rational } from "../../number/rational.ts";
import { DomainError } from "../../proof/errors.ts";
import { rationalLines } from "../map/singularcubic.ts";
import { plainPolynomial } from "./print.ts";

const LONG_FORM = "y^2 + a1*x*y + a3*y = x^3 + a2*x^2 + a4*x + a6 in two letters";

/** The refusal for a polynomial that is not of the long form. */
export function notLongForm<T>(F: Field<T>, f: Polynomial<T>): DomainError {
  const { what, hint } = lineIn(F, f) ?? diagnosis(f);
  return new DomainError({
    subject: "curve",
    given: `${plainPolynomial(F, f)} = 0 is ${what}`,
    expected: LONG_FORM,
    hint,
    argument: "equation",
  });
}

/** A cubic over Q that holds a line has no use for the advice to give it as a cubic. */
function lineIn<T>(F: Field<T>, f: Polynomial<T>): { readonly what: string; readonly hint: string } | undefined {
  const letters = f.variables.length;
  if (F.name !== "Q" || degree(f) !== 3 || letters < 2 || !(letters === 2 || isHomogeneous(f))) return undefined;
  const form = (letters === 2 ? homogenise(f, extraLetter(f.variables)) : f) as unknown as Polynomial<Rational>;
  const lines = rationalLines(form);
  if (lines.length === 0) return undefined;
  const named = lines.map((line) => `${plainPolynomial(rationals, line)} = 0`);
  return {
    what: `a cubic that contains the ${lines.length > 1 ? "lines" : "line"} ${named.join(", ")}`,
    hint: "With a line as component it is no curve of genus 1.",
  };
}

function extraLetter(used: readonly string[]): string {
  return ["z", "w", "t", "s"].find((name) => !used.includes(name))!;
}

function diagnosis<T>(f: Polynomial<T>): { readonly what: string; readonly hint: string } {
  const d = degree(f);
  const letters = f.variables.length;
  if (d < 0) return { what: "an empty condition", hint: "Both sides are the same polynomial." };
  if (letters < 2)
    return { what: `an equation in ${letters === 0 ? "no letter" : "one letter"}`, hint: "A curve needs two letters." };
  if (d <= 2) return { what: `of degree ${d}: a line or a conic, of genus 0`, hint: "" };
  if (d === 3 && (letters === 2 || isHomogeneous(f))) {
    return {
      what: "a plane cubic that is not in the long form",
      hint: "Give it as cubic`...` and a rational point of it: C.through({ ... }).curve.",
    };
  }
  if (letters === 2 && f.variables.every((name) => degreeIn(f, name) <= 2)) {
    return {
      what: "an equation of degree 2 in each letter",
      hint: "Give it as biquadratic`...` and a rational point of it: C.through({ ... }).curve.",
    };
  }
  if (letters === 2 && f.variables.some((name) => isDoubleCover(f, name))) {
    return {
      what: `y^2 = polynomial of degree ${d} or a cover like it`,
      hint: d === 4 ? "Give it as quartic`...` and a rational point of it." : "Its genus is not 1.",
    };
  }
  return {
    what: `of degree ${d} in ${letters} letters`,
    hint: "Bring it into one of the forms cubic, quartic, biquadratic or quadrics first.",
  };
}

/** Quadratic in one letter, with a constant coefficient there: y² = f(x). */
function isDoubleCover<T>(f: Polynomial<T>, y: string): boolean {
  return degreeIn(f, y) === 2;
}
