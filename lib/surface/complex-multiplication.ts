import type { Multiplication } from "../lattice/complex-multiplication.ts";
import type { Standing } from "../proof/standing.ts";

/** What is known about the complex multiplication of a lattice. */
export class ComplexMultiplication {
  readonly outcome: Multiplication["kind"];
  /** Discriminant of the order of all multiplications, if there is (or may be) one. */
  readonly discriminant: bigint | undefined;
  readonly classNumber: number | undefined;
  readonly reason: string;
  readonly standing: Standing;

  constructor(answer: Multiplication) {
    this.outcome = answer.kind;
    this.discriminant = "discriminant" in answer ? answer.discriminant : undefined;
    this.classNumber = "classNumber" in answer ? answer.classNumber : undefined;
    this.reason = answer.reason;
    this.standing = standingOf(answer);
  }

  /** The conductor f and the fundamental discriminant d of the order: discriminant = f² d. */
  get conductor(): bigint | undefined {
    if (this.discriminant === undefined) return undefined;
    let [f, d] = [1n, this.discriminant];
    for (let p = 2n; p * p <= -d; p++) {
      while (d % (p * p) === 0n && [0n, -3n].includes((d / (p * p)) % 4n)) [f, d] = [f * p, d / (p * p)];
    }
    return f;
  }

  toString(): string {
    const words = {
      yes: `complex multiplication by the order of discriminant ${this.discriminant}, class number ${this.classNumber}`,
      no: "no complex multiplication",
      consistent: `consistent with complex multiplication of discriminant ${this.discriminant}`,
      excluded: "complex multiplication excluded for small discriminants",
    };
    return `${words[this.outcome]}: ${this.reason}`;
  }
}

function standingOf(answer: Multiplication): Standing {
  if (answer.kind === "consistent") return { kind: "conjectured", evidence: answer.reason };
  if (answer.kind === "excluded") return { kind: "undecided", tried: answer.reason };
  return { kind: "proved", argument: answer.reason };
}
