import { AMPLITUDE, EPSILON, JACOBI, JACOBI_INVERSE, ZETA } from "../function/jacobi-operations.ts";
import { COMPLETE } from "../function/operations.ts";
import { latticeOfInvariants } from "../lattice/build.ts";
import { exp } from "../number/functions.ts";
import type { Operation } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { i, π } from "../number/symbols.ts";
import { apply, Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import type { ConventionKey } from "../proof/conventions.ts";
import { Lattice } from "./lattice.ts";
import { type ModulusInput, type ModulusPair, modulusPair, principalRoot, type SideInput } from "./modulus.ts";

type Value = Real | Complex;

/**
 * Jacobi's functions of one modulus. All twelve are meromorphic in u and single-valued in m; pq = pn/qn for any two of the letters s, c, d, n.
 * Values near m = 0 and m = 1 keep their digits where { m } or { m1 } says how near.
 */
export class Jacobi {
  /** The parameter m = k². */
  readonly m: Value;
  /** 1 − m, with all its digits. */
  readonly m1: Value;
  /** For a real m > 1 the side of the cut on which K, E, τ and the nome are taken. */
  readonly side: "above" | "below" | undefined;
  /** √(e1 − e3) of the cubic where periods, roots, invariants or a lattice were given, else 1: ℘(z) = e3 + (scale·ns(scale·z))². */
  readonly scale: Value;

  constructor({ m, m1, side, scale }: ModulusPair) {
    this.scale = scale ?? Real.from(1);
    this.m = m;
    this.m1 = m1;
    this.side = side && (side === 1 ? "above" : "below");
  }

  /** The quarter period K = K(m). On the cut m > 1 by the side; throws DomainError without one, PoleError for m = 1. */
  get K(): Value {
    return apply(COMPLETE.K, [this.m, this.m1, this.turn]);
  }

  /** K′ = K(m1); iK′ is the other quarter period. On its cut m < 0 by the side; throws DomainError without one, PoleError for m = 0. */
  get K1(): Value {
    return apply(COMPLETE.K, [this.m1, this.m, this.coTurn]);
  }

  /** The complete integral E(m). */
  get E(): Value {
    return apply(COMPLETE.E, [this.m, this.m1, this.turn]);
  }

  /** The complete integral E(m1). */
  get E1(): Value {
    return apply(COMPLETE.E, [this.m1, this.m, this.coTurn]);
  }

  private get turn(): 1 | -1 | undefined {
    return this.side && (this.side === "above" ? 1 : -1);
  }

  /** m1 = 1 − m lies on the other side. */
  private get coTurn(): 1 | -1 | undefined {
    return this.side && (this.side === "above" ? -1 : 1);
  }

  /** τ = iK′/K. */
  get tau(): Complex {
    return Complex.from(i.times(this.K1).div(this.K));
  }

  /** j = 256 (1 − m + m²)³/(m m1)², with j(i) = 1728. Throws PoleError for m = 0 and 1. */
  get j(): Value {
    const t = this.m.times(this.m1);
    return t.neg().plus(1).pow(3).times(256).div(t.pow(2));
  }

  /**
   * The lattice of ℘, with e1 − e3 = scale², by its invariants: 2K/scale and 2iK′/scale are a basis of it for m off the cuts.
   * Throws   DomainError for m = 0 and 1, where there is none.
   */
  get lattice(): Lattice {
    const { m, m1 } = this;
    const square = this.scale.pow(2);
    const g2 = m.times(m1).neg().plus(1).times("4/3").times(square.pow(2));
    const g3 = m1.plus(1).times(m.plus(1)).times(m1.minus(m)).times("4/27").times(square.pow(3));
    return new Lattice(latticeOfInvariants(g2, g3));
  }

  /** The modulus k = √m, principal root. */
  get k(): Value {
    return principalRoot(this.m);
  }

  /** q_θ = exp(πiτ) = exp(−πK′/K). */
  get qTheta(): Value {
    return exp(this.K1.div(this.K).times(π.neg()));
  }

  /** q_mod = exp(2πiτ) = q_θ². */
  get qMod(): Value {
    return exp(this.K1.div(this.K).times(π.times(-2)));
  }

  /** sn(u): odd, zeros at 2jK + 2kiK′, poles at 2jK + (2k+1)iK′. Throws PoleError. Source DLMF 22.2.4. */
  sn(u: ComplexNumeric): Value {
    return this.value("sn", u);
  }
  /** cn(u): even, cn 0 = 1, zeros at (2j+1)K + 2kiK′, the poles of sn. Throws PoleError. Source DLMF 22.2.5. */
  cn(u: ComplexNumeric): Value {
    return this.value("cn", u);
  }
  /** dn(u): even, dn 0 = 1, zeros at (2j+1)K + (2k+1)iK′, the poles of sn. Throws PoleError. Source DLMF 22.2.6. */
  dn(u: ComplexNumeric): Value {
    return this.value("dn", u);
  }
  /** 1/sn. */
  ns(u: ComplexNumeric): Value {
    return this.value("ns", u);
  }
  /** 1/cn. */
  nc(u: ComplexNumeric): Value {
    return this.value("nc", u);
  }
  /** 1/dn. */
  nd(u: ComplexNumeric): Value {
    return this.value("nd", u);
  }
  /** sn/cn. */
  sc(u: ComplexNumeric): Value {
    return this.value("sc", u);
  }
  /** sn/dn. */
  sd(u: ComplexNumeric): Value {
    return this.value("sd", u);
  }
  /** cn/sn. */
  cs(u: ComplexNumeric): Value {
    return this.value("cs", u);
  }
  /** cn/dn. */
  cd(u: ComplexNumeric): Value {
    return this.value("cd", u);
  }
  /** dn/sn. */
  ds(u: ComplexNumeric): Value {
    return this.value("ds", u);
  }
  /** dn/cn. */
  dc(u: ComplexNumeric): Value {
    return this.value("dc", u);
  }

  /**
   * The amplitude am(u) = ∫_0^u dn along the segment from 0 to u, with sn = sin am and cn = cos am; odd.
   *
   * Domain   any u and m for which no pole of dn lies on the segment.
   * Branch   cuts run from each pole (iK′ modulo 2K and 2iK′) outward, away from 0, along the ray from 0 through it; across one am jumps by 2π. On the cut
   *          itself am has no value here, from neither side: it is refused, with the pole named. An argument beside it says the side. For real u and
   *          m < 1 there is no cut: am(u + 2K) = am(u) + π; for real m > 1 am stays between ± arcsin(1/√m).
   * Error    proved. An enclosure of u is followed from its midpoint; one that a cut may pass through has the value of that side, and where it
   *          holds a pole sn and cn have none, which is refused.
   * Throws   DomainError where the segment meets a pole. Source DLMF 22.16(i).
   * @example jacobi({ m: "1/3" }).am(1)   // 0.95476267676528002382...
   */
  am(u: ComplexNumeric): Value {
    return this.odd(AMPLITUDE, u);
  }

  /** ε(u) = ∫_0^u dn², meromorphic; E(am u | m) for real u and m < 1. Throws PoleError at the poles of dn. Source DLMF 22.16(ii). */
  epsilon(u: ComplexNumeric): Value {
    return this.odd(EPSILON, u);
  }

  /** Jacobi's zeta function Z(u) = ε(u) − u E/K, of period 2K. Source DLMF 22.16(iii). */
  zeta(u: ComplexNumeric): Value {
    return this.odd(ZETA, u);
  }

  // The inverses are pq⁻¹(x) = front·RF(..) with principal roots (DLMF 22.15(ii), 19.25.30). Their cuts lie where an argument of RF is negative: for 0 < m < 1
  // on the real line outside of the values that pq takes there (arcsn: |x| > 1), and for the odd ones also along the imaginary axis beyond its branch points.
  // On a cut a real x is refused with DomainError, neither side being preferred; an x beside it has the value of its side; an enclosure that meets a cut throws
  // BranchError.

  /** A u with sn(u) = x: in [−K, K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arcsn(x: ComplexNumeric): Value {
    return this.inverse("sn", x);
  }
  /** A u with cn(u) = x: in [0, 2K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arccn(x: ComplexNumeric): Value {
    return this.inverse("cn", x);
  }
  /** A u with dn(u) = x: in [0, K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arcdn(x: ComplexNumeric): Value {
    return this.inverse("dn", x);
  }
  /** A u with ns(u) = x: in [−K, K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arcns(x: ComplexNumeric): Value {
    return this.inverse("ns", x);
  }
  /** A u with nc(u) = x: in [0, 2K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arcnc(x: ComplexNumeric): Value {
    return this.inverse("nc", x);
  }
  /** A u with nd(u) = x: in [0, K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arcnd(x: ComplexNumeric): Value {
    return this.inverse("nd", x);
  }
  /** A u with sc(u) = x: in [−K, K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arcsc(x: ComplexNumeric): Value {
    return this.inverse("sc", x);
  }
  /** A u with sd(u) = x: in [−K, K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arcsd(x: ComplexNumeric): Value {
    return this.inverse("sd", x);
  }
  /** A u with cs(u) = x: in [−K, K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arccs(x: ComplexNumeric): Value {
    return this.inverse("cs", x);
  }
  /** A u with cd(u) = x: in [0, 2K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arccd(x: ComplexNumeric): Value {
    return this.inverse("cd", x);
  }
  /** A u with ds(u) = x: in [−K, K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arcds(x: ComplexNumeric): Value {
    return this.inverse("ds", x);
  }
  /** A u with dc(u) = x: in [0, 2K] for real x and 0 < m < 1, by principal roots elsewhere. */
  arcdc(x: ComplexNumeric): Value {
    return this.inverse("dc", x);
  }

  get conventions(): readonly ConventionKey[] {
    return ["modulus"];
  }

  toString(): string {
    return `Jacobi functions with m = ${this.m}`;
  }

  private value(name: string, given: ComplexNumeric): Value {
    const u = scalar(given, name);
    return apply(JACOBI[name]!, [u, this.m, this.m1], this.known(name, u));
  }

  /** What symmetry alone settles: the values at 0, and sn, cn, cd at K. */
  private known(name: string, u: Value): Rational | undefined {
    const [p, q] = name;
    if (isZero(u) && q !== "s") return p === "s" ? Rational.zero : Rational.one;
    const atK = u.origin?.operation === COMPLETE.K && u.origin.operands[0] === this.m;
    if (!atK || q === "c") return undefined;
    if (p === "c") return Rational.zero;
    return name === "sn" || name === "ns" ? Rational.one : undefined;
  }

  private odd(operation: Operation, given: ComplexNumeric): Value {
    const u = scalar(given, operation.name);
    return apply(operation, [u, this.m, this.m1], isZero(u) ? Rational.zero : undefined);
  }

  private inverse(name: string, given: ComplexNumeric): Value {
    const x = scalar(given, `arc${name}`);
    return apply(JACOBI_INVERSE[name]!, [x, this.m, this.m1], isZero(x) && name[0] === "s" ? Rational.zero : undefined);
  }
}

function isZero(x: Value): boolean {
  return x.exact instanceof Rational && x.exact.sign() === 0;
}

/**
 * Jacobi's functions for a modulus that is named: jacobi({ m }), jacobi({ m1 }) with m1 = 1 − m, jacobi({ k }), jacobi({ tau }), jacobi({ qTheta }),
 * jacobi({ qMod }), jacobi({ periods }), jacobi({ roots: [e1, e2, e3] }), jacobi({ lattice: L }) and the other names of ModulusInput.
 *
 * Throws   TypeError for a bare { q }, or unless exactly one name is used.
 * @example jacobi({ m: "81/100" }).dn("1/5")   // 0.9840560289645665155...
 */
export function jacobi(input: ModulusInput & SideInput): Jacobi {
  return new Jacobi(modulusPair({ ...input }, "jacobi"));
}
