import { type Relation, relationOf } from "../lattice/field/relation.ts";
import { exactOf, scalarText } from "../lattice/field/scalar.ts";
import { isExactElement } from "../lattice/field/valuation.ts";
import type { Exact } from "../number/origin.ts";
import { DomainError } from "../proof/errors.ts";
import type { Standing } from "../proof/standing.ts";
import type { EllipticFunction } from "./elliptic-function.ts";

/** F(X, Y) = 0 between X = f and Y = g: irreducible, with exact coefficients. */
export class AlgebraicRelation {
  readonly first: EllipticFunction;
  readonly second: EllipticFunction;
  /** coefficients[i][j] of X^i Y^j. */
  readonly coefficients: readonly (readonly Exact[])[];
  private readonly relation: Relation;

  constructor(first: EllipticFunction, second: EllipticFunction, relation: Relation) {
    this.first = first;
    this.second = second;
    this.relation = relation;
    this.coefficients = relation.map((row) => row.map((c) => exactOf(c)!));
  }

  /** Degrees in X and in Y. */
  get degrees(): readonly [number, number] {
    return [this.coefficients.length - 1, this.coefficients[0]!.length - 1];
  }

  /** The sum of exact normal forms is 0, so the relation is proved where it stands. */
  get standing(): Standing {
    return { kind: "proved", argument: "Σ c X^i Y^j is 0 in normal form, and no smaller bidegree has a relation" };
  }

  /** F(x, y) as a function of the lattice for two others: 0 for the two it was made of. */
  at(x: EllipticFunction, y: EllipticFunction): EllipticFunction {
    let sum = x.times(0);
    this.coefficients.forEach((row, i) => {
      row.forEach((c, j) => {
        if (`${c}` !== "0")
          sum = sum.plus(
            x
              .pow(i)
              .times(y.pow(j))
              .times(c as never),
          );
      });
    });
    return sum;
  }

  /** "Y² − 4X³ + 4X − 1 = 0". */
  toString(): string {
    const terms: string[] = [];
    const [p, q] = this.degrees;
    for (let j = q; j >= 0; j--) {
      for (let i = p; i >= 0; i--) {
        const c = this.relation[i]![j]!;
        if (c.size > 0) terms.push(termText(scalarText(c), letters("X", i) + letters("Y", j)));
      }
    }
    return `${terms.join(" + ").replaceAll("+ −", "− ")} = 0`;
  }
}

function letters(name: string, n: number): string {
  const digits = [..."⁰¹²³⁴⁵⁶⁷⁸⁹"];
  if (n === 0) return "";
  return n === 1 ? name : name + [...`${n}`].map((d) => digits[Number(d)]).join("");
}

function termText(coefficient: string, monomial: string): string {
  if (monomial === "") return coefficient;
  if (coefficient === "1") return monomial;
  if (coefficient === "−1") return `−${monomial}`;
  const negative = coefficient.startsWith("−") && !/ /.test(coefficient);
  const size = negative ? coefficient.slice(1) : coefficient;
  return `${negative ? "−" : ""}${/[ /]/.test(size) ? `(${size})` : size}${monomial}`;
}

/** See `EllipticFunction.relation`. */
export function relationBetween(f: EllipticFunction, g: EllipticFunction): AlgebraicRelation {
  if (f.lattice !== g.lattice) {
    throw new DomainError({
      subject: "relation",
      given: "functions of two lattices",
      expected: "two functions of one lattice",
      argument: "g",
    });
  }
  if (!isExactElement(f.element) || !isExactElement(g.element)) {
    throw new DomainError({
      subject: "relation",
      given: "functions with coefficients, or a lattice with g2 and g3, that are not exact numbers",
      expected: "exact coefficients",
      hint: "Give the lattice by exact { invariants }.",
    });
  }
  return new AlgebraicRelation(f, g, relationOf(f.element, g.element));
}
