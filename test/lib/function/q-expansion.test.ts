import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Matrix } from "../../../lib/function/matrix.ts";
import { moved } from "../../../lib/function/modular-action.ts";
import { dedekindEta, modularLambda, weber } from "../../../lib/function/modular-forms.ts";
import { multipliers } from "../../../lib/function/multipliers.ts";
import { divide, multiply } from "../../../lib/function/power-series.ts";
import {
  type ExpansionName,
  eisensteinExpansion,
  expansionOf,
  type QExpansion,
} from "../../../lib/function/q-expansion.ts";
import { thetaJet } from "../../../lib/function/theta-values.ts";
import * as ball from "../../../lib/number/ball.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { entries, read } from "./reference.ts";

describe("exact q-expansions — oracle: published coefficients", () => {
  it.each(entries("modular", "q_expansion"))("$input.series", ({ input, expected }) => {
    const name = input.series as string;
    const weight = /^E(\d+)$/.exec(name)?.[1];
    const series = weight
      ? eisensteinExpansion(Number(weight), expected.length)
      : expansionOf(name as ExpansionName, expected.length);
    expect(series.coefficients.map(String)).toEqual(expected);
    expect(series.first.toString()).toBe(String(input.first_power));
  });

  it("E12 has the denominators of 691 — oracle: B_12 = −691/2730", () => {
    const { coefficients } = eisensteinExpansion(12, 3);
    expect(coefficients.map(String)).toEqual(["1", "65520/691", "134250480/691"]);
  });

  it("τ(n) mod 691 = σ_11(n) — oracle: Ramanujan's congruence, 300 terms", () => {
    const { coefficients } = expansionOf("delta", 300);
    coefficients.forEach((c, k) => {
      const n = k + 1;
      let sigma = 0n;
      for (let d = 1; d <= n; d++) if (n % d === 0) sigma += BigInt(d) ** 11n;
      expect((c.num - sigma) % 691n).toBe(0n);
    });
  });

  it("expansions sum to the functions at τ = 0.1 + 1.3i — oracle: the analytic routes", () => {
    const tau = read({ re: "0.1", im: "1.3" }, 300);
    const at = (series: QExpansion): Disc => {
      const turn = series.nome === "q_mod" ? 1 : 0;
      const log = disc.mulI(disc.mulBall(tau, ball.ldexp(ball.pi(300), turn), 300));
      const power = (e: ball.Ball) => disc.exp(disc.mulBall(log, e, 300), 300);
      const q = power(ball.one);
      const sum = [...series.coefficients]
        .reverse()
        .reduce((acc: Disc, c) => disc.add(disc.mul(acc, q, 300), disc.fromRational(c, 300), 300), disc.zero);
      // The rest of 60 terms is far below 2^−100.
      const value = disc.mul(sum, power(ball.fromRational(series.first, 300)), 300);
      return disc.widenBy(value, { man: 1n, exp: -100, rad: 0 }, 300, false);
    };
    const routes: Record<Exclude<ExpansionName, "delta" | "j">, Disc> = {
      eta: dedekindEta(tau, 200),
      lambda: modularLambda(tau, 200).lambda,
      theta2: thetaJet(2, disc.zero, tau, 0, 200)[0]!,
      theta3: thetaJet(3, disc.zero, tau, 0, 200)[0]!,
      theta4: thetaJet(4, disc.zero, tau, 0, 200)[0]!,
      f: weber("f", tau, 200),
      f1: weber("f1", tau, 200),
      f2: disc.divBall(weber("f2", tau, 200), ball.sqrt(ball.fromInt(2), 200), 200),
    };
    for (const [name, value] of Object.entries(routes)) {
      expect(disc.overlaps(at(expansionOf(name as ExpansionName, 60)), value), name).toBe(true);
    }
  });
});

const matrices = fc.array(fc.integer({ min: -9, max: 9 }), { minLength: 1, maxLength: 6 }).map((shifts) =>
  shifts.reduce<Matrix>(({ a, b, c, d }, n) => ({ a: a * BigInt(n) + b, b: -a, c: c * BigInt(n) + d, d: -c }), {
    a: 1n,
    b: 0n,
    c: 0n,
    d: 1n,
  }),
);

function jacobi(top: bigint, bottom: bigint): number {
  let [a, n] = [((top % bottom) + bottom) % bottom, bottom];
  let sign = 1;
  while (a !== 0n) {
    for (; a % 2n === 0n; a /= 2n) if (n % 8n === 3n || n % 8n === 5n) sign = -sign;
    [a, n] = [n, a];
    if (a % 4n === 3n && n % 4n === 3n) sign = -sign;
    a %= n;
  }
  return n === 1n ? sign : 0;
}

describe("the multiplier of η", () => {
  it("η(Mτ) = ε (cτ+d)^½ η(τ) — oracle: values on both sides", () => {
    const tau = read({ re: "0.3", im: "0.8" }, 300);
    fc.assert(
      fc.property(matrices, (m) => {
        const e = multipliers(m).eta;
        const angle = ball.div(ball.mulInt(ball.pi(200), e, 200), ball.fromInt(12), 200);
        const factor = disc.add(disc.mulInt(tau, m.c, 200), { re: m.d, im: 0n, exp: 0, rad: 0, axis: "real" }, 200);
        const right = disc.mul(
          disc.mul(disc.exp(disc.mulI(disc.fromBall(angle)), 200), disc.sqrt(factor, 200), 200),
          dedekindEta(tau, 200),
          200,
        );
        expect(disc.overlaps(dedekindEta(moved(m, tau, 300), 200), right)).toBe(true);
      }),
      { numRuns: 100, seed: 1_877 },
    );
  });

  it("closed form for odd c > 0: (d/c) exp(πi((a+d)c − bd(c²−1) − 3c)/12) — oracle: Jacobi symbol, Knopp 1970, chapter 4", () => {
    fc.assert(
      fc.property(matrices, ({ a, b, c, d }) => {
        fc.pre(c > 0n && c % 2n === 1n);
        const e = (a + d) * c - b * d * (c * c - 1n) - 3n * c + (jacobi(d, c) === 1 ? 0n : 12n);
        expect(multipliers({ a, b, c, d }).eta).toBe(Number(((e % 24n) + 24n) % 24n));
      }),
      { numRuns: 200, seed: 1_970 },
    );
  });
});

describe("the multipliers of θ1 .. θ4", () => {
  it("θ_i(v/(cτ+d) | Mτ) = ε (cτ+d)^½ exp(πi c v²/(cτ+d)) θ_j(v | τ) — oracle: values on both sides", () => {
    const wp = 200;
    const [tau, v] = [read({ re: "0.3", im: "0.8" }, 300), read({ re: "0.2", im: "-0.1" }, 300)];
    const right = ([1, 2, 3, 4] as const).map((j) => thetaJet(j, v, tau, 0, wp)[0]!);
    fc.assert(
      fc.property(matrices, (m) => {
        const factor = disc.add(disc.mulInt(tau, m.c, 300), { re: m.d, im: 0n, exp: 0, rad: 0, axis: "real" }, 300);
        const at = disc.div(v, factor, 300);
        const square = disc.mulInt(disc.mul(v, at, 300), m.c, 300);
        for (const { index, of, eighths } of multipliers(m).theta) {
          const turn = disc.add(square, disc.ldexp(disc.fromBall(ball.fromInt(eighths)), -2), 300);
          const scale = disc.exp(disc.mulI(disc.mulBall(turn, ball.pi(300), 300)), wp);
          const known = disc.mul(disc.mul(scale, disc.sqrt(factor, wp), wp), right[of - 1]!, wp);
          expect(disc.overlaps(thetaJet(index, at, moved(m, tau, 400), 0, wp)[0]!, known), `θ${index}`).toBe(true);
        }
      }),
      { numRuns: 100, seed: 1_829 },
    );
  });

  it("−M turns the sign of θ1 and the root — oracle: exact tables", () => {
    const plus = multipliers({ a: 1n, b: 0n, c: 0n, d: 1n });
    const minus = multipliers({ a: -1n, b: 0n, c: 0n, d: -1n });
    expect(plus.theta.map((t) => [t.index, t.of, t.eighths])).toEqual([
      [1, 1, 0],
      [2, 2, 0],
      [3, 3, 0],
      [4, 4, 0],
    ]);
    // (−1)^(1/2) = i = exp(2πi 2/8): the multiplier takes it back, and θ1(−v) = −θ1(v).
    expect(minus.theta.map((t) => [t.index, t.of, t.eighths])).toEqual([
      [1, 1, 2],
      [2, 2, 6],
      [3, 3, 6],
      [4, 4, 6],
    ]);
    expect(minus.eta).toBe(18);
  });
});

describe("long series", () => {
  it("a packed product is the product, signs and all — oracle: coefficient by coefficient", () => {
    fc.assert(
      fc.property(
        fc.array(fc.bigInt({ min: -(10n ** 20n), max: 10n ** 20n }), { minLength: 150, maxLength: 220 }),
        (x) => {
          const y = [1n, ...x.slice(1).reverse()];
          const count = x.length;
          const direct = Array.from({ length: count }, (_, n) => {
            let sum = 0n;
            for (let k = 0; k <= n; k++) sum += x[k]! * y[n - k]!;
            return sum;
          });
          expect(multiply(x, y, count)).toEqual(direct);
          expect(multiply(divide(x, y, count), y, count)).toEqual(x);
        },
      ),
      // 20 runs: each compares some 20000 products.
      { numRuns: 20, seed: 1_882 },
    );
  });

  it("the coefficients of j up to q^1000: congruences c(5^a n) ≡ 0 mod 5^(a+1), c(2^a n) ≡ 0 mod 2^(3a+8) — oracle: Lehner 1949", () => {
    const { coefficients } = expansionOf("j", 1002);
    const c = (n: number) => coefficients[n + 1]!.num;
    for (const n of [25, 125, 625, 1000]) {
      let power = 0;
      for (let m = n; m % 5 === 0; m /= 5) power++;
      expect(c(n) % 5n ** BigInt(power + 1), `c(${n})`).toBe(0n);
    }
    for (const n of [512, 256, 768, 1000]) {
      let power = 0;
      for (let m = n; m % 2 === 0; m /= 2) power++;
      expect(c(n) % 2n ** BigInt(3 * power + 8), `c(${n})`).toBe(0n);
    }
  });
});
