// What happens at the ends: sizes beyond writing out, dropped records, calls that are cut off, the cap of the working precision.
import vm from "node:vm";
import { afterEach, describe, expect, it } from "vitest";
import * as ball from "../../../lib/number/ball.ts";
import { mostBits, provedDigits, workingPrecision } from "../../../lib/number/context.ts";
import { complex, enclose, real } from "../../../lib/number/convert.ts";
import { atDigits, exp, gamma, ln, sin, sqrt } from "../../../lib/number/functions.ts";
import { toDecimal } from "../../../lib/number/interchange.ts";
import { fromValueData } from "../../../lib/number/json.ts";
import { Rational } from "../../../lib/number/rational.ts";
import { i, π } from "../../../lib/number/symbols.ts";
import type { Complex, Real } from "../../../lib/number/values.ts";
import { DomainError, PoleError, PrecisionError } from "../../../lib/proof/errors.ts";

afterEach(() => {
  provedDigits(20);
});

describe("numbers too large or too small to write out", () => {
  // ln 10 · 43429448190 = 99999999999.2511..., and e^0.7488 = 2.114.
  const huge = exp("1e11");

  it("print by their logarithm — oracle: e^(10^11) = 2.114...·10^43429448190 by hand", () => {
    expect(huge.toString()).toBe("2.1143786513061196887...e43429448190");
    expect(exp("-1e11").toString()).toMatch(/^4\.729\d+\.\.\.e-43429448191$/);
    expect(exp("1e11 ± 1e-3").toString()).toBe("2.1144e43429448190 ± 3.5e43429448187");
    expect(real(2).pow(100_000_000_000).toString()).toBe("2.5010335717734712313...e30102999566");
    expect(toDecimal(huge, 15).toString()).toBe("2.11437865130612e+43429448190");
  });

  it("complex ones print both parts to one place, and a part below it as 0 with that place", () => {
    expect(exp(complex("1e11", "1")).toString()).toBe(
      "1.1424036607790638132...e43429448190 + 1.7791882859713525458...e43429448190 i",
    );
    expect(huge.plus(i.times(sqrt(3))).toString()).toBe("2.1143786513061196887...e43429448190 + 0...e43429448171 i");
    expect(complex(sqrt(2).times("1e30"), sqrt(3).times(5000)).toString()).toBe(
      "1.4142135623730950488...e30 + 0...e11 i",
    );
  });

  it("their data reads back to what holds them", () => {
    const numbers: (Real | Complex)[] = [
      huge,
      exp("-1e11 ± 1e-3"),
      exp(complex("1e11", "1")),
      exp(enclose(complex("-1e11", "1"), "1e-3")),
    ];
    for (const x of numbers) {
      const back = fromValueData(JSON.parse(JSON.stringify(x))) as Real;
      const sharp = (x.standing === "defined" ? x.digits(40) : x) as Real;
      expect(back.contains(sharp)).toBe(true);
    }
  });

  it("have no integer part that is written out, and hold no small number", () => {
    expect(huge.floor()).toBeUndefined();
    expect(() => ball.floor({ man: 1n, exp: 2 ** 40, rad: 0 })).toThrow(DomainError);
    expect(huge.contains("1/3")).toBe(false);
    expect(complex(huge).contains(7)).toBe(false);
    expect(huge.equals(7)).toBe(false);
  });

  it("an exponent beyond 2^45 is refused with its size", () => {
    expect(() => exp("1e15")).toThrow(/about 2\^50; expected a size under 2\^45/);
    expect(() => exp("-1e100000")).toThrow(DomainError);
  });
});

describe("chains of more than 256 operations", () => {
  const chain = (): Real => {
    let x = sqrt(2);
    for (let k = 0; k < 300; k++) x = x.plus(sqrt(3));
    return x;
  };

  it("keep their digits, and say that the record is dropped when more are asked for", () => {
    const x = chain();
    expect(x.digits(20).toString()).toBe("521.02945583303628310...");
    for (const y of [x, x.times(π), sin(x)]) {
      expect(() => y.digits(50)).toThrow(PrecisionError);
      expect(() => y.digits(50)).toThrow(/record of operations was dropped, since it was longer than 256.*atDigits/);
    }
    expect(sqrt(2).plus(1).dropped).toBe(false);
  });

  it("atDigits runs them again with the digits — oracle: √2 + 300√3", () => {
    const x = atDigits(50, chain);
    expect(x.overlaps(sqrt(2).plus(sqrt(3).times(300)).digits(60))).toBe(true);
    expect(x.toString()).toBe("521.02945583303628310703559117597140816141124801849...");
  });
});

describe("working precision", () => {
  it("of a call that is cut off without unwinding ends with the task", async () => {
    const before = workingPrecision();
    const endless = (): void => {
      atDigits(500, () => {
        for (;;);
      });
    };
    // The engine ends the script from outside: no finally block runs.
    expect(() => vm.runInNewContext("endless()", { endless }, { timeout: 30 })).toThrow(/timed out/);
    await Promise.resolve();
    expect(workingPrecision()).toBe(before);
    expect(provedDigits()).toBe(20);
  });

  it("of a call that throws ends with it", () => {
    const before = workingPrecision();
    expect(() =>
      atDigits(500, () => {
        throw new RangeError("own");
      }),
    ).toThrow(RangeError);
    expect(workingPrecision()).toBe(before);
  });

  it("rises in atDigits up to 64n + 4096 bits and no further", () => {
    const hidden = (): Real => exp(ln(real(2))).minus(2);
    const seen: number[] = [];
    const run = (): Real => {
      seen.push(workingPrecision());
      return hidden();
    };
    expect(() => atDigits(30, run)).toThrow(PrecisionError);
    expect(seen.at(-1)).toBe(mostBits(30));
    expect(Math.max(...seen)).toBe(64 * 30 + 4096);
    expect(seen.every((bits, k) => k === 0 || bits > seen[k - 1]!)).toBe(true);
  });

  it("is not raised for a result that rests on measured input", () => {
    let runs = 0;
    const x = atDigits(30, () => {
      runs++;
      return sqrt("2 ± 1e-6");
    });
    expect(runs).toBe(1);
    expect(x.standing).toBe("measured");
  });
});

describe("Γ at large arguments", () => {
  it("Γ(q + 1) = q·Γ(q) across the methods — oracle: the recurrence", () => {
    for (const [n, d] of [
      [2999n, 3n],
      [3001n, 3n],
      [-2999n, 3n],
      [-3001n, 3n],
      [100_001n, 7n],
      [-700_001n, 7n],
      [10n ** 12n + 1n, 7n],
    ] as const) {
      for (const prec of [64, 200, 1500]) {
        const q = Rational.of(n, d);
        const next = ball.gammaRational(q.plus(1), prec);
        const product = ball.mul(ball.gammaRational(q, prec), ball.fromRational(q, prec + 20), prec);
        expect(ball.overlaps(next, product)).toBe(true);
        expect(ball.bits(next)).toBeGreaterThan(prec - 6);
      }
    }
  });

  it("of a large integer is its factorial — oracle: the exact product", () => {
    let factorial = 1n;
    for (let k = 2n; k < 3000n; k++) factorial *= k;
    for (const prec of [64, 300]) {
      expect(ball.contains(ball.gammaRational(Rational.of(3000n), prec), Rational.of(factorial))).toBe(true);
    }
  });

  it("refuses poles and sizes beyond 2^40", () => {
    expect(() => gamma(-100_000_000)).toThrow(PoleError);
    expect(() => gamma("1e13")).toThrow(/size of at most 2\^40/);
  });
});
