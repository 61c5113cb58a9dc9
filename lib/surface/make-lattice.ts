import { COMPLETE } from "../function/operations.ts";
import { latticeOfInvariants, latticeOfPeriods, orientation } from "../lattice/build.ts";
import type { Quantity } from "../lattice/quantity.ts";
import { ln } from "../number/functions.ts";
import { Rational } from "../number/rational.ts";
import { i, π } from "../number/symbols.ts";
import { apply, type Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { invariantsOfJ } from "./invariants-of-j.ts";
import { Lattice, type LatticeInput } from "./lattice.ts";

/**
 * A lattice from its full periods, half-periods, τ, invariants g2 and g3, roots e1, e2, e3, or j.
 *
 * Domain   periods independent over R; Im τ > 0; g2³ ≠ 27 g3²; distinct roots with sum 0. Numbers count as typed, and exactly.
 *          The nome by name, qTheta = exp(πiτ) or qMod = exp(2πiτ), gives periods 1 and τ by the principal logarithm; m, k, λ the lattice with e1 − e3 = 1.
 * Branch   periods keep the given basis, swapped with a notice if Im(ω2/ω1) < 0. Invariants, roots and j give the real basis if they
 *          are real, else the reduced one. j gives g2 = g3 = 27j/(j − 1728), for 0 and 1728 the lattices (0, 1) and (1, 0).
 * Throws   DomainError for dependent periods, Im τ <= 0, a multiple root, roots with another sum.
 */
export function lattice(input: LatticeInput): Lattice {
  const keys = Object.keys(input);
  if ("q" in input) throw bareNome();
  if (keys.length !== 1) {
    throw new TypeError(`lattice: got { ${keys.join(", ")} }; expected exactly one of ${WAYS}`);
  }
  if ("periods" in input) return fromPeriods(input.periods);
  if ("halfPeriods" in input) {
    return fromPeriods(input.halfPeriods.map((w) => scalar(w, "lattice").times(2)) as [Complex, Complex]);
  }
  if ("tau" in input) return fromTau(input.tau);
  if ("invariants" in input) return fromInvariants(...input.invariants);
  if ("roots" in input) return fromRoots(input.roots);
  if ("j" in input) return fromJ(input.j);
  if ("J" in input) return fromJ(scalar(input.J, "lattice").times(1728));
  if ("qTheta" in input) return fromNome(input.qTheta, 1);
  if ("qMod" in input) return fromNome(input.qMod, 2);
  if ("lambda" in input) return fromParameter(scalar(input.lambda, "lattice"));
  if ("m" in input) return fromParameter(scalar(input.m, "lattice"));
  if ("k" in input) return fromParameter(scalar(input.k, "lattice").pow(2));
  throw new TypeError(`lattice: got { ${keys[0]} }; expected one of ${WAYS}`);
}

const WAYS = "periods, halfPeriods, tau, qTheta, qMod, invariants, roots, lambda, m, k, j, J";

function bareNome(): DomainError {
  return new DomainError({
    subject: "lattice",
    given: "a bare nome q",
    expected: "{ qTheta } for exp(πiτ) or { qMod } for exp(2πiτ)",
    hint: "Two nomes are in use; name the one that is meant.",
    argument: "q",
  });
}

/** τ = ln q/(πi) or ln q/(2πi), principal. */
function fromNome(given: ComplexNumeric, times: 1 | 2): Lattice {
  const q = scalar(given, "lattice");
  const size = q.abs().minus(1).sign();
  if (size !== -1 || (q.exact instanceof Rational && q.exact.sign() === 0)) {
    throw new DomainError({
      subject: "lattice",
      given: `the nome ${q}`,
      expected: "0 < |q| < 1",
      argument: times === 1 ? "qTheta" : "qMod",
    });
  }
  const negative = q instanceof Real && q.sign() === -1;
  const logarithm = negative ? π.times(i).plus(ln(q.neg())) : ln(q as Complex);
  return fromTau(logarithm.div(π.times(i).times(times)));
}

/**
 * The lattice with (e2 − e3)/(e1 − e3) = m and e1 − e3 = 1, so that ω1 = 2K(m) and ω2 = 2iK(1 − m): by its exact invariants for real m, by these
 * periods for others, whose roots then have the labels that m means.
 */
function fromParameter(m: Real | Complex): Lattice {
  if (m.exact instanceof Rational && (m.exact.sign() === 0 || m.exact.equals(1))) {
    throw new DomainError({
      subject: "lattice",
      given: `the parameter m = ${m}`,
      expected: "m other than 0 and 1",
      hint: "There two roots meet; degenerate({ invariants }) has the functions that remain.",
      argument: "m",
    });
  }
  const notice = "m, k and λ fix a lattice up to a factor; this one has e1 − e3 = 1.";
  if (!(m instanceof Real)) {
    const m1 = m.neg().plus(1);
    const [K, K1] = [apply(COMPLETE.K, [m, m1]), apply(COMPLETE.K, [m1, m])];
    return new Lattice(fromPeriods([K.times(2), K1.times(2).times(i)]).data, notice);
  }
  const third = Rational.of(1, 3);
  const [e1, e2, e3] = [m.neg().plus(2), m.times(2).minus(1), m.plus(1).neg()].map((e) => e.times(third));
  const made = fromRoots([e1!, e2!, e3!]);
  return new Lattice(made.data, notice);
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
