// Claims about answers that carry their own ground: a torsion subgroup, complex multiplication, a recognised number.

import { sameExact } from "../number/exactness.ts";
import { Quadratic } from "../number/quadratic.ts";
import { gcd, Rational } from "../number/rational.ts";
import type { Recognition } from "../number/recognise.ts";
import { Complex, Real } from "../number/values.ts";
import type { Standing } from "../proof/standing.ts";
import type { Relation } from "./claim-value.ts";
import { ComplexMultiplication } from "./complex-multiplication.ts";
import { Point } from "./point.ts";
import { TorsionSubgroup } from "./torsion.ts";

/** The standing of a claim that has such an answer on a side; undefined for all others. */
export function answerStanding(lhs: unknown, relation: Relation, rhs: unknown): Standing | undefined {
  if (relation === "in" && lhs instanceof Point && rhs instanceof TorsionSubgroup) return inTorsion(lhs, rhs);
  if (relation !== "=" && relation !== "≠") return undefined;
  if (lhs === undefined) return { kind: "undecided", tried: "recognition, which found nothing of that height" };
  for (const [answer, other] of [
    [lhs, rhs],
    [rhs, lhs],
  ]) {
    const found = compared(answer, other);
    if (found) return relation === "=" ? found : negated(found);
  }
  return undefined;
}

function compared(answer: unknown, other: unknown): Standing | undefined {
  if (answer instanceof TorsionSubgroup) return torsion(answer, other);
  if (answer instanceof ComplexMultiplication) return multiplication(answer, other);
  if (isRecognition(answer)) return recognised(answer, other);
  return undefined;
}

/** A group by its order (7), its structure ([2, 4]) or its name ("Z/2 × Z/4"). */
function torsion(group: TorsionSubgroup, other: unknown): Standing | undefined {
  const structure = other instanceof TorsionSubgroup ? other.structure : other;
  const said = Array.isArray(structure) ? structure.map(Number).join() : undefined;
  const order = integerOf(other);
  const same =
    said !== undefined
      ? said === group.structure.join()
      : order !== undefined
        ? order === BigInt(group.order)
        : typeof other === "string"
          ? other.replace(/\s/g, "") === String(group).replace(/\s/g, "")
          : undefined;
  if (same === undefined) return undefined;
  return same
    ? { kind: "proved", argument: groundOf(group) }
    : { kind: "refuted", evidence: `the torsion subgroup is ${group}, of order ${group.order}` };
}

/** The counts that settle the bound, and the points that reach it. */
function groundOf({ counts, generators, structure, order, settledByDivision }: TorsionSubgroup): string {
  let bound = 0n;
  const used: string[] = [];
  for (const { p, count } of counts) {
    const next = gcd(bound, BigInt(count));
    if (next !== bound) used.push(`#E(F_${p}) = ${count}`);
    bound = next;
  }
  const points = generators.map((P, k) => `${P} has order ${structure[k]}`);
  const excluded = settledByDivision.map((l) => `no point has order ${l}, by its division polynomial`);
  const divides = order === 1 && bound === 1n ? "have no common divisor" : "its order divides";
  const first = order === 1 && bound === 1n ? `${used.join(", ")} ${divides}` : `${divides} ${used.join(", ")}`;
  return [first, ...excluded, ...points].join("; ");
}

/** A point of the same curve whose order is finite. */
function inTorsion(P: Point<unknown>, group: TorsionSubgroup): Standing {
  const member = P.isOrigin || group.points.some((Q) => sameCurve(P, Q) && Q.equals(P as Point));
  if (!member) return { kind: "refuted", evidence: `${P} is not among the ${group.order} points of finite order` };
  const n = P.isOrigin ? 1 : P.order();
  return { kind: "proved", argument: `${n}-fold it is O, by the group law` };
}

function sameCurve(P: Point<unknown>, Q: Point): boolean {
  return (
    P.curve.field.name === Q.curve.field.name && (P.curve as unknown) !== undefined && `${P.curve}` === `${Q.curve}`
  );
}

/** The discriminant of the order, or "none". */
function multiplication(answer: ComplexMultiplication, other: unknown): Standing | undefined {
  const { outcome, discriminant, reason } = answer;
  const D = other === "none" ? undefined : integerOf(other);
  if (D === undefined && other !== "none") return undefined;
  switch (outcome) {
    case "yes":
      return D === discriminant
        ? { kind: "proved", argument: reason }
        : { kind: "refuted", evidence: `${reason}, so the discriminant is ${discriminant}` };
    case "no":
      return D === undefined ? { kind: "proved", argument: reason } : { kind: "refuted", evidence: reason };
    case "consistent":
      return D === discriminant
        ? { kind: "conjectured", evidence: reason }
        : { kind: "undecided", tried: `${reason}, of discriminant ${discriminant}` };
    case "excluded":
      return { kind: "undecided", tried: reason };
  }
}

export function isRecognition(value: unknown): value is Recognition {
  if (typeof value !== "object" || value === null) return false;
  const { value: exact, spare, standing } = value as Partial<Recognition>;
  return (exact instanceof Rational || exact instanceof Quadratic) && spare !== undefined && standing !== undefined;
}

/** A recognised number is a conjecture, whatever it is compared with. */
function recognised({ value, standing }: Recognition, other: unknown): Standing | undefined {
  const exact = exactOf(other);
  if (!exact) return undefined;
  return sameExact(value, exact) ? standing : { kind: "refuted", evidence: `the number recognised is ${value}` };
}

function exactOf(x: unknown): Rational | Quadratic | undefined {
  if (x instanceof Rational || x instanceof Quadratic) return x;
  if (x instanceof Real || x instanceof Complex) return x.exact;
  if (typeof x === "string") return Rational.parse(x);
  const n = integerOf(x);
  return n === undefined ? undefined : Rational.of(n);
}

function integerOf(x: unknown): bigint | undefined {
  if (typeof x === "bigint") return x;
  if (typeof x === "number") return Number.isSafeInteger(x) ? BigInt(x) : undefined;
  const exact = x instanceof Real || x instanceof Complex ? x.exact : x;
  return exact instanceof Rational && exact.den === 1n ? exact.num : undefined;
}

/** The standing of ≠, where = is known so. A conjecture that two things are equal leaves it open whether they differ. */
function negated(standing: Standing): Standing {
  if (standing.kind === "proved") return { kind: "refuted", evidence: standing.argument };
  if (standing.kind === "refuted") return { kind: "proved", argument: standing.evidence };
  if (standing.kind === "undecided") return standing;
  return { kind: "undecided", tried: standing.kind === "conjectured" ? standing.evidence : "enclosures that overlap" };
}
