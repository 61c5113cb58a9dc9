// Maps of curves, as their formulas.

import type { Field } from "../algebra/field.ts";
import { plainPolynomial } from "../curve/equation/print.ts";
import type { FormulaPart } from "../curve/map/formula.ts";
import type { Morphism } from "../surface/morphism.ts";
import type { Kind, Show } from "./kind.ts";
import { elementTex, polynomialTex } from "./polynomial-tex.ts";
import { array, fraction, texName } from "./tex.ts";

// biome-ignore lint/suspicious/noExplicitAny: a map of any two curves; its ends name their fields in both directions
type AnyMorphism = Morphism<any, any>;

export const morphismKind: Kind<AnyMorphism> = {
  text: (phi) => [String(phi), ...formulaLines(phi).map((line) => `  ${line}`)].join("\n"),
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
  // All that a reader needs to check the map by substitution: both curves, the formula, and the kernel of an isogeny.
  data: (phi, show) => ({
    kind: "map",
    title: String(phi),
    degree: String(phi.degree),
    from: show.data(phi.from),
    to: show.data(phi.to),
    formula: formulaLines(phi),
    ...(phi.kernelPolynomial ? { kernel: plainPolynomial(fieldOf(phi), phi.kernelPolynomial) } : {}),
  }),
};

function formulaLines(phi: AnyMorphism): string[] {
  const F = fieldOf(phi);
  const { kind, parts } = phi.formula;
  if (kind === "affine") return parts.map((part) => `${primed(part.letter)} = ${quotientText(F, part)}`);
  const letters = parts.map(({ letter }) => primed(letter)).join(" : ");
  return [`(${letters}) = (${parts.map((part) => quotientText(F, part)).join(" : ")})`];
}

function fieldOf(phi: AnyMorphism): Field<unknown> {
  return phi.from.field as Field<unknown>;
}

function primed(letter: string): string {
  return `${letter}′`;
}

function quotientText(F: Field<unknown>, part: FormulaPart<unknown>): string {
  const [n, d] = [plainPolynomial(F, part.numerator), denominatorText(F, part)];
  return d === "1" ? n : `(${n})/${d}`;
}

/** "x^2", "(3*x + 1)^3", "(9*(x - 1)^2)": factored, in brackets where it is a product or a sum. */
function denominatorText(F: Field<unknown>, { constant, powers }: FormulaPart<unknown>): string {
  const number = F.format(constant);
  const factors = powers.map(({ base, exponent }) => {
    const text = plainPolynomial(F, base);
    const whole = base.terms.size > 1 && (exponent > 1 || powers.length > 1 || number !== "1") ? `(${text})` : text;
    return exponent === 1 ? whole : `${whole}^${exponent}`;
  });
  const all = number === "1" ? factors : [number, ...factors];
  const text = all.join("*") || "1";
  const single =
    all.length === 1 && (powers.length === 0 || powers[0]!.exponent > 1 || powers[0]!.base.terms.size === 1);
  return single || text === "1" ? text : `(${text})`;
}

function quotientTex(F: Field<unknown>, part: FormulaPart<unknown>, show: Show): string {
  const [n, d] = [polynomialTex(F, part.numerator, show), denominatorTex(F, part, show)];
  return d === "1" ? n : `\\displaystyle ${fraction(n, d)}`;
}

function denominatorTex(F: Field<unknown>, { constant, powers }: FormulaPart<unknown>, show: Show): string {
  const number = F.format(constant);
  const alone = powers.length === 1 && number === "1";
  const factors = powers.map(({ base, exponent }) => {
    const tex = polynomialTex(F, base, show);
    const whole = base.terms.size > 1 && !(alone && exponent === 1) ? `\\left(${tex}\\right)` : tex;
    return exponent === 1 ? whole : `${whole}^{${exponent}}`;
  });
  return [...(number === "1" ? [] : [elementTex(F, constant, show)]), ...factors].join(" ") || "1";
}
