// Maps of curves, as their formulas.

import type { Field } from "../algebra/field.ts";
import { plainPolynomial } from "../curve/equation/print.ts";
import type { FormulaPart } from "../curve/map/formula.ts";
import type { Morphism } from "../surface/morphism.ts";
import type { Kind, Show } from "./kind.ts";
import { polynomialTex } from "./polynomial-tex.ts";
import { array, fraction, texName } from "./tex.ts";

// biome-ignore lint/suspicious/noExplicitAny: a map of any two curves; its ends name their fields in both directions
type AnyMorphism = Morphism<any, any>;

export const morphismKind: Kind<AnyMorphism> = {
  text: (phi) => {
    const F = fieldOf(phi);
    const { kind, parts } = phi.formula;
    const formula =
      kind === "affine"
        ? parts.map((part) => `  ${primed(part.letter)} = ${quotientText(F, part)}`).join("\n")
        : `  (${parts.map(({ letter }) => primed(letter)).join(" : ")}) = (${parts.map((part) => quotientText(F, part)).join(" : ")})`;
    return `${phi}\n${formula}`;
  },
  tex: (phi, show) => {
    const F = fieldOf(phi);
    const { kind, parts } = phi.formula;
    if (kind === "affine") {
      return array(
        "rcl",
        parts.map((part) => [`${texName(part.letter)}'`, "=", quotientTex(F, part, show)]),
      );
    }
    const letters = parts.map(({ letter }) => `${texName(letter)}'`).join(" : ");
    const rows = parts.map((part, k) => [
      `${polynomialTex(F, part.numerator, show)}${k + 1 < parts.length ? " :" : ""}`,
    ]);
    return `\\left( ${letters} \\right) = \\left( ${array("l", rows)} \\right)`;
  },
  data: (phi) => ({ kind: "map", title: String(phi), degree: String(phi.degree) }),
};

function fieldOf(phi: AnyMorphism): Field<unknown> {
  return phi.from.field as Field<unknown>;
}

function primed(letter: string): string {
  return `${letter}′`;
}

function quotientText(F: Field<unknown>, { numerator, denominator }: FormulaPart<unknown>): string {
  const [n, d] = [plainPolynomial(F, numerator), plainPolynomial(F, denominator)];
  return d === "1" ? n : `(${n})/(${d})`;
}

function quotientTex(F: Field<unknown>, { numerator, denominator }: FormulaPart<unknown>, show: Show): string {
  const [n, d] = [polynomialTex(F, numerator, show), polynomialTex(F, denominator, show)];
  return d === "1" ? n : `\\displaystyle ${fraction(n, d)}`;
}
