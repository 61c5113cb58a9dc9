import type { ClassPolynomial as Data } from "../function/class-polynomial.ts";

/** The class polynomial of an imaginary quadratic discriminant: monic, with proved integer coefficients. */
export class ClassPolynomial {
  readonly discriminant: bigint;
  /** The primitive reduced forms [a, b, c]. */
  readonly forms: readonly (readonly [bigint, bigint, bigint])[];
  /** From the leading 1 down to the constant term. */
  readonly coefficients: readonly bigint[];

  constructor({ discriminant, forms, coefficients }: Data) {
    this.discriminant = discriminant;
    this.forms = forms.map(({ a, b, c }) => [a, b, c]);
    this.coefficients = coefficients;
  }

  /** The class number h(D), which is the degree. */
  get classNumber(): number {
    return this.forms.length;
  }

  /** X^3 + 3491750 X^2 - 5151296875 X + 12771880859375. */
  toString(): string {
    const top = this.coefficients.length - 1;
    const terms = this.coefficients.flatMap((c, k) => (c === 0n ? [] : [{ c, power: top - k }]));
    return terms.map(({ c, power }, k) => `${sign(c, k === 0)}${monomial(c < 0n ? -c : c, power)}`).join(" ");
  }

  toJSON(): {
    readonly kind: "class polynomial";
    readonly discriminant: string;
    readonly coefficients: readonly string[];
  } {
    return {
      kind: "class polynomial",
      discriminant: String(this.discriminant),
      coefficients: this.coefficients.map(String),
    };
  }
}

function sign(c: bigint, first: boolean): string {
  if (first) return c < 0n ? "-" : "";
  return c < 0n ? "- " : "+ ";
}

function monomial(size: bigint, power: number): string {
  const x = power === 0 ? "" : power === 1 ? "X" : `X^${power}`;
  if (x === "") return String(size);
  return size === 1n ? x : `${size} ${x}`;
}
