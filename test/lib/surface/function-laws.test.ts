// Laws of the functions at random arguments, through what a cell sees. Twenty runs each: a run takes some dozen values of 20 digits.
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  Complex,
  carlson,
  complex,
  exp,
  i,
  jacobi,
  lattice,
  legendre,
  modular,
  type Real,
  rational,
  theta,
  π,
} from "../../../lib/index.ts";
import { Rational } from "../../../lib/number/rational.ts";

type Value = Real | Complex;
const RUNS = { numRuns: 20, seed: 20261201 };

const between = (low: number, high: number) =>
  fc.integer({ min: low * 1000, max: high * 1000 }).map((n) => Rational.of(n, 1000));
const positive = between(0.001, 9);
const offCut = fc
  .tuple(between(-4, 6), between(0.01, 5), fc.boolean())
  .map(([x, y, up]) => complex(x, up ? y : y.neg()));
const parameter = between(0.01, 0.99);
const upper = fc.tuple(between(-2, 2), between(0.02, 3)).map(([x, y]) => complex(x, y));
/** Words in τ + n and −1/τ multiplied out. */
const unimodular = fc.array(fc.integer({ min: -4, max: 4 }), { minLength: 1, maxLength: 4 }).map((word) =>
  word.reduce<[[number, number], [number, number]]>(
    ([[a, b], [c, d]], n) => [
      [a * n + b, -a],
      [c * n + d, -c],
    ],
    [
      [1, 0],
      [0, 1],
    ],
  ),
);

function same(x: Value, y: Value): void {
  const gap = Complex.from(x).minus(y);
  expect(gap.overlaps(0), `${x} and ${y}`).toBe(true);
  expect(gap.abs().minus(Complex.from(x).abs().plus(1).times("1e-12")).sign(), `${x} and ${y}`).toBe(-1);
}

describe("Carlson's integrals", () => {
  const degrees = { RF: -1, RC: -1, RD: -3, RJ: -3, RG: 1 } as const;

  it("have the degrees −1/2, −1/2, −3/2, −3/2, 1/2 — oracle: homogeneity, DLMF 19.20, t ↦ λt in the integrals", () => {
    fc.assert(
      fc.property(fc.array(fc.oneof(positive, offCut), { minLength: 4, maxLength: 4 }), positive, (list, factor) => {
        const args = list.map((x) => Complex.from(x instanceof Rational ? complex(x, 0) : x));
        for (const [name, degree] of Object.entries(degrees)) {
          const f = carlson[name as "RF"] as (...x: Complex[]) => Value;
          const n = name === "RC" ? 2 : name === "RJ" ? 4 : 3;
          const scaled = args.slice(0, n).map((x) => x.times(factor));
          same(f(...scaled), f(...args.slice(0, n)).times(complex(factor, 0).sqrt().pow(degree)));
        }
      }),
      RUNS,
    );
  });

  it("are symmetric in the arguments that are alike — oracle: the definition", () => {
    fc.assert(
      fc.property(offCut, offCut, positive, offCut, (x, y, z, p) => {
        same(carlson.RF(x, y, z), carlson.RF(z, x, y));
        same(carlson.RG(x, y, z), carlson.RG(y, z, x));
        same(carlson.RD(x, z, y), carlson.RD(z, x, y));
        same(carlson.RJ(x, y, z, p), carlson.RJ(y, z, x, p));
      }),
      RUNS,
    );
  });

  it("double: RF(x, y, z) = 2 RF(x + λ, y + λ, z + λ) — oracle: DLMF 19.26.18", () => {
    fc.assert(
      fc.property(positive, positive, positive, (x, y, z) => {
        const [a, b, c] = [x, y, z].map((w) => complex(w, 0).sqrt()) as [Value, Value, Value];
        const shift = a.times(b).plus(b.times(c)).plus(c.times(a));
        const moved = [x, y, z].map((w) => shift.plus(w)) as [Value, Value, Value];
        same(carlson.RF(x, y, z), carlson.RF(...moved).times(2));
      }),
      RUNS,
    );
  });
});

describe("Jacobi's and Legendre's functions", () => {
  it("descend by Landen's transformation — oracle: DLMF 22.7.2, 19.8.12", () => {
    fc.assert(
      fc.property(parameter, between(-3, 3), (m, u) => {
        const root = complex(Rational.one.minus(m), 0).sqrt();
        const k1 = root.neg().plus(1).div(root.plus(1));
        const [J, lower] = [jacobi({ m }), jacobi({ k: k1 })];
        const front = k1.plus(1);
        same(J.K, lower.K.times(front));
        const s = lower.sn(front.pow(-1).times(u));
        same(J.sn(u), front.times(s).div(k1.times(s.pow(2)).plus(1)));
      }),
      RUNS,
    );
  });

  it("shift by quarter periods — oracle: DLMF table 22.4.3", () => {
    fc.assert(
      fc.property(parameter, between(-2, 2), between(0.01, 0.7), (m, x, y) => {
        const J = jacobi({ m });
        const u = complex(x, y);
        const complement = complex(Rational.one.minus(m), 0).sqrt();
        same(J.sn(u.plus(J.K)), J.cd(u));
        same(J.cn(u.plus(J.K)), J.sd(u).times(complement).neg());
        same(J.dn(u.plus(J.K)), J.nd(u).times(complement));
        same(J.sn(u.plus(J.K1.times(i))), J.ns(u).div(J.k));
        same(J.dn(u.plus(J.K1.times(i))), J.cs(u).times(i).neg());
      }),
      RUNS,
    );
  });

  it("arccn and arccd go on across the imaginary axis — oracle: the function back, and values beside", () => {
    fc.assert(
      fc.property(parameter, between(0.01, 0.99), fc.boolean(), (m, part, down) => {
        const J = jacobi({ m });
        // Below the branch points ik′/k of arccn and i/k (further out) of arccd.
        const y = complex(Rational.one.minus(m).div(m), 0)
          .sqrt()
          .times(part)
          .times(down ? -1 : 1);
        const [x, beside] = [y.times(i), y.times(i).plus("1e-9")];
        for (const [f, back] of [
          [J.arccn(x), J.cn(J.arccn(x))],
          [J.arccd(x), J.cd(J.arccd(x))],
        ] as const) {
          same(back, x);
          const near = [J.arccn(beside), J.arccd(beside)].map((v) => Complex.from(v).minus(f).abs().toDouble());
          expect(Math.min(...near)).toBeLessThan(1e-5);
        }
      }),
      RUNS,
    );
  });

  it("Legendre's relation, and K′ of m is K of 1 − m — oracle: DLMF 19.7.1", () => {
    fc.assert(
      fc.property(parameter, (m) => {
        const { K, E, K1, E1 } = jacobi({ m });
        same(E.times(K1).plus(E1.times(K)).minus(K.times(K1)), π.div(2));
        same(K1, legendre.K({ m1: m }));
      }),
      RUNS,
    );
  });
});

describe("one number in four languages", () => {
  it("℘ by Jacobi and theta functions, its inverse by Carlson and Legendre — oracle: DLMF 23.6.5, 23.6.21, 19.25.35", () => {
    fc.assert(
      fc.property(between(0.1, 3), between(0.1, 0.9), between(0.05, 0.45), (d, share, part) => {
        // e1 − e3 = d, e2 between them, the sum 0.
        const middle = d.times(share);
        const mean = d.plus(middle).div(3);
        const [e1, e2, e3] = [d.minus(mean), middle.minus(mean), mean.neg()];
        const L = lattice({ roots: [e1, e2, e3] });
        const J = jacobi({ roots: [e1, e2, e3] });
        const period = L.periods[0].re;
        const z = period.times(part);
        const value = L.wp(z);
        same(period, Complex.from(J.K).times(2).div(J.scale));
        same(value, J.ns(J.scale.times(z)).pow(2).times(J.scale.pow(2)).plus(e3));
        const at = { v: part, tau: L.tau };
        const quotient = theta(4, at)
          .times(theta(2, { v: 0, tau: L.tau }))
          .times(theta(3, { v: 0, tau: L.tau }));
        same(value, quotient.div(theta(1, at)).times(π.div(period)).pow(2).plus(e3));
        same(z, carlson.RF(value.minus(e1), value.minus(e2), value.minus(e3)));
        const m = middle.div(d);
        same(z.times(J.scale), legendre.F({ phi: J.am(J.scale.times(z)), m }));
      }),
      RUNS,
    );
  });
});

describe("the action of SL2(Z) — oracle: the transformation law, both sides as they are", () => {
  it("weights of E_k and Δ, j unmoved, the multipliers of η and θ1 .. θ4", () => {
    fc.assert(
      fc.property(unimodular, upper, between(-0.5, 0.5), (matrix, tau, v) => {
        const M = modular.act(matrix, tau);
        const c = matrix[1][0];
        const root = Complex.from(M.factor).sqrt();
        const turn = (part: number, whole: number) => exp(i.times(π).times(rational(`${2 * part}/${whole}`)));
        same(modular.j(M.tau).pow(-1), modular.j(tau).pow(-1));
        same(modular.E(6, M.tau).div(modular.E(6, tau)), M.factor.pow(6));
        same(modular.delta(M.tau).div(modular.delta(tau)), M.factor.pow(12));
        same(modular.eta(M.tau).div(modular.eta(tau)), turn(M.etaTwentyFourths, 24).times(root));
        const gauss = exp(i.times(π).times(c).times(v.pow(2)).div(M.factor));
        for (const { index, of, eighths } of M.theta) {
          const moved = theta(index, { v: Complex.from(M.factor).pow(-1).times(v), tau: M.tau });
          same(moved, turn(eighths, 8).times(root).times(gauss).times(theta(of, { v, tau })));
        }
      }),
      RUNS,
    );
  });

  it("λ takes the six values of its orbit, by the matrix modulo 2", () => {
    fc.assert(
      fc.property(unimodular, upper, (matrix, tau) => {
        const [[a, b], [c, d]] = matrix.map((row) => row.map((n) => Math.abs(n) % 2)) as [number[], number[]];
        const x = modular.lambda(tau);
        const y = x.neg().plus(1);
        const orbit: Readonly<Record<string, Value>> = {
          "10,01": x,
          "01,10": y,
          "11,01": x.div(x.minus(1)),
          "10,11": x.pow(-1),
          "11,10": x.minus(1).div(x),
          "01,11": y.pow(-1),
        };
        same(modular.lambda(modular.act(matrix, tau).tau), orbit[`${a}${b},${c}${d}`]!);
      }),
      RUNS,
    );
  });
});
