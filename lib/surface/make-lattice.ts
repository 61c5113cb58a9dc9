import { latticeOfInvariants, latticeOfPeriods, orientation } from "../lattice/build.ts";
import type { Quantity } from "../lattice/quantity.ts";
import { Rational } from "../number/rational.ts";
import { type Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { invariantsOfJ } from "./invariants-of-j.ts";
import { Lattice, type LatticeInput } from "./lattice.ts";

/**
 * A lattice from its full periods, half-periods, τ, invariants g2 and g3, roots e1, e2, e3, or j.
 *
 * Domain   periods independent over R; Im τ > 0; g2³ ≠ 27 g3²; distinct roots with sum 0. Numbers count as typed, and exactly.
 * Branch   periods keep the given basis, swapped with a notice if Im(ω2/ω1) < 0. Invariants, roots and j give the real basis if they
 *          are real, else the reduced one. j gives g2 = g3 = 27j/(j − 1728), for 0 and 1728 the lattices (0, 1) and (1, 0).
 * Throws   DomainError for dependent periods, Im τ <= 0, a multiple root, roots with another sum.
 */
export function lattice(input: LatticeInput): Lattice {
  const keys = Object.keys(input);
  if (keys.length !== 1) {
    throw new TypeError(
      `lattice: got { ${keys.join(", ")} }; expected exactly one of periods, halfPeriods, tau, invariants, roots, j`,
    );
  }
  if ("periods" in input) return fromPeriods(input.periods);
  if ("halfPeriods" in input) {
    return fromPeriods(input.halfPeriods.map((w) => scalar(w, "lattice").times(2)) as [Complex, Complex]);
  }
  if ("tau" in input) return fromTau(input.tau);
  if ("invariants" in input) return fromInvariants(...input.invariants);
  if ("roots" in input) return fromRoots(input.roots);
  if ("j" in input) return fromJ(input.j);
  throw new TypeError(`lattice: got { ${keys[0]} }; expected periods, halfPeriods, tau, invariants, roots or j`);
}

function fromPeriods([first, second]: readonly [ComplexNumeric, ComplexNumeric]): Lattice {
  const [w1, w2] = [scalar(first, "lattice"), scalar(second, "lattice")];
  if (orientation(w1, w2) > 0) return new Lattice(latticeOfPeriods(w1, w2));
  return new Lattice(
    latticeOfPeriods(w2, w1),
    "Im(ω2/ω1) < 0 as given, so the periods were exchanged: the matrix of the change is [[0, 1], [1, 0]].",
  );
}

function fromTau(given: ComplexNumeric): Lattice {
  const tau = scalar(given, "lattice");
  if (tau instanceof Real || orientation(Rational.one, tau) < 0) {
    throw new DomainError({
      subject: "lattice",
      given: `τ = ${tau}`,
      expected: "Im τ > 0",
      hint:
        tau instanceof Real
          ? "Two periods with a real ratio make no lattice."
          : "The conjugate of τ, or −τ, may be meant.",
      argument: "tau",
    });
  }
  return new Lattice(latticeOfPeriods(Real.from(1), tau));
}

function fromInvariants(g2: ComplexNumeric, g3: ComplexNumeric, notice?: string): Lattice {
  const given: [Quantity, Quantity] = [scalar(g2, "lattice"), scalar(g3, "lattice")];
  return new Lattice(latticeOfInvariants(...given), notice);
}

function fromRoots(given: readonly [ComplexNumeric, ComplexNumeric, ComplexNumeric]): Lattice {
  const [e1, e2, e3] = given.map((e) => scalar(e, "lattice")) as [Complex, Complex, Complex];
  const sum = e1.plus(e2).plus(e3);
  if (sum.exact ? !(sum.exact instanceof Rational && sum.exact.sign() === 0) : !sum.overlaps(0)) {
    throw new DomainError({
      subject: "lattice",
      given: `roots with the sum ${sum}`,
      expected: "e1 + e2 + e3 = 0",
      hint: "Subtract a third of the sum from each.",
      argument: "roots",
    });
  }
  const g2 = e1.times(e2).plus(e1.times(e3)).plus(e2.times(e3)).times(-4);
  return fromInvariants(g2, e1.times(e2).times(e3).times(4));
}

function fromJ(given: ComplexNumeric): Lattice {
  const j = scalar(given, "lattice");
  const exact = j.exact instanceof Rational ? j.exact : undefined;
  if (exact?.sign() === 0) return fromInvariants(0, 1, "j = 0 has the lattices with g2 = 0; this one has g3 = 1.");
  if (exact?.equals(1728)) return fromInvariants(1, 0, "j = 1728 has the lattices with g3 = 0; this one has g2 = 1.");
  return fromInvariants(
    ...invariantsOfJ(j),
    "j fixes a lattice up to a factor; this one has g2 = g3 = 27j/(j − 1728).",
  );
}
