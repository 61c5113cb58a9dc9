import type { QExpansion } from "../function/q-expansion.ts";
import { Rational } from "../number/rational.ts";

/** The beginning of an expansion in a named nome; every coefficient is exact. */
export class QSeries {
  readonly name: string;
  /** q_mod = exp(2πiτ) or q_θ = exp(πiτ). */
  readonly nome: "q_mod" | "q_θ";
  /** The exponent of the first coefficient; those of the others follow by ones. */
  readonly first: Rational;
  readonly coefficients: readonly Rational[];

  constructor({ name, nome, first, coefficients }: QExpansion) {
    this.name = name;
    this.nome = nome;
    this.first = first;
    this.coefficients = coefficients;
  }

  /** The coefficient of q^exponent. Throws RangeError beyond the terms that were asked for. */
  coefficient(exponent: Rational | bigint | number): Rational {
    const at = (exponent instanceof Rational ? exponent : Rational.of(exponent)).minus(this.first);
    if (!at.isInteger() || at.sign() < 0) return Rational.zero;
    const found = this.coefficients[Number(at.num)];
    if (found) return found;
    const end = this.first.plus(this.coefficients.length);
    throw new RangeError(
      `expansion: the coefficient of exponent ${exponent} is beyond the terms computed; ask for more terms (O(q^${end}))`,
    );
  }

  /** "q_mod^-1 + 744 + 196884 q_mod + O(q_mod^2)". */
  toString(): string {
    const terms = this.coefficients.flatMap((c, k) => (c.sign() === 0 ? [] : [this.term(c, this.first.plus(k))]));
    const sum = terms.map(({ minus, text }, k) =>
      k === 0 ? (minus ? `-${text}` : text) : `${minus ? "-" : "+"} ${text}`,
    );
    return [...sum, `+ O(${power(this.nome, this.first.plus(this.coefficients.length))})`].join(" ");
  }

  toJSON(): {
    readonly kind: "expansion";
    readonly nome: string;
    readonly first: string;
    readonly coefficients: readonly string[];
  } {
    const { nome, first, coefficients } = this;
    return { kind: "expansion", nome, first: first.toString(), coefficients: coefficients.map(String) };
  }

  private term(c: Rational, exponent: Rational): { readonly minus: boolean; readonly text: string } {
    const size = c.abs();
    const q = exponent.sign() === 0 ? "" : power(this.nome, exponent);
    if (q === "") return { minus: c.sign() < 0, text: size.toString() };
    return { minus: c.sign() < 0, text: size.equals(1) ? q : `${size} ${q}` };
  }
}

function power(nome: string, exponent: Rational): string {
  if (exponent.equals(1)) return nome;
  return exponent.isInteger() ? `${nome}^${exponent}` : `${nome}^(${exponent})`;
}
