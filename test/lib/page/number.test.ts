import temml from "temml";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { provedDigits } from "../../../lib/number/context.ts";
import { complex, enclose, exact, real } from "../../../lib/number/convert.ts";
import { agm } from "../../../lib/number/functions.ts";
import { Rational } from "../../../lib/number/rational.ts";
import { bundle } from "../../../lib/page/bundle.ts";
import { parseDecimal, texDecimal } from "../../../lib/page/digits.ts";
import { table } from "../../../lib/page/table.ts";

/** First 60 decimals of √2, from the published expansion (OEIS A002193). */
const SQRT2 = "1.41421356237309504880168872420969807856967187537694807317667973";

const before = provedDigits();
beforeEach(() => {
  provedDigits(50);
});
afterEach(() => {
  provedDigits(before);
});

const text = (value: unknown) => bundle(value)?.["text/plain"] as string;
const latex = (value: unknown) => bundle(value)?.["text/latex"] as string;
/** TeX of digits without what only sets them apart. */
const bare = (tex: string) =>
  tex.replace(/\\displaystyle|\\phantom\{[^}]*\}|\\begin\{array\}\{l\}|\\end\{array\}|\\,|\\\\|[$\s]/g, "");

describe("numbers on a page", () => {
  it("a defined number shows its digits with dots, in groups in TeX — oracle: published digits of √2", () => {
    const root = real(2).sqrt().times(real(1).plus(0));
    const sum = agm(root, root);
    expect(text(sum)).toMatch(/^1\.41421356237\d+\.\.\.$/);
    expect(SQRT2.startsWith(text(sum).replace("...", ""))).toBe(true);
    expect(bare(latex(sum))).toBe(text(sum).replace("...", "\\ldots"));
    expect(latex(sum)).toContain("1.41421\\,35623\\,73095");
  });

  it("an exact root is shown as such, with its digits", () => {
    expect(text(real("3/10").sqrt())).toMatch(/^1\/10 √30 = 0\.5477225\d+\.\.\.$/);
    expect(latex(real("3/10").sqrt())).toContain("\\frac{\\sqrt{30}}{10} = 0.54772");
  });

  it("more digits than a line holds go on below, none lost — oracle: its own text", () => {
    const number = agm(1, 2).digits(133);
    expect(bare(latex(number))).toBe(text(number).replace("...", "\\ldots"));
    expect(latex(number)).toContain("\\phantom{1.}");
  });

  it("no line is left with a digit or two: 51 to 60 places stay on one, 101 to 110 are shared out", () => {
    const rows = (places: number) => {
      const tex = texDecimal(parseDecimal(`0.${"7".repeat(places)}`)!);
      return tex.split("\\\\").map((row) => row.replace(/\\phantom\{0\.\}/, "").match(/7/g)?.length ?? 0);
    };
    expect(rows(51)).toEqual([51]);
    expect(rows(60)).toEqual([60]);
    expect(rows(100)).toEqual([50, 50]);
    expect(rows(101)).toEqual([45, 45, 11]);
  });

  it("exact numbers are fractions and roots", () => {
    expect(latex(real("-22/7"))).toBe("$\\displaystyle -\\frac{22}{7}$");
    expect(latex(exact`(1+√5)/2`)).toBe("$\\displaystyle \\frac{1 + \\sqrt{5}}{2}$");
    expect(latex(complex("1/2", "-3/4"))).toBe("$\\displaystyle \\frac{1}{2} - \\frac{3}{4}\\,i$");
    expect(latex(Rational.of(12345678n))).toBe("$\\displaystyle 12\\,345\\,678$");
  });

  it("a measured number shows its radius, a double says what it is", () => {
    expect(text(enclose("1.25", "1e-6"))).toBe("1.25 ± 1e-6");
    expect(latex(enclose("1.25", "1e-6"))).toBe("$\\displaystyle 1.25 \\pm 10^{-6}$");
    expect(text(real(0.1))).toMatch(/^0\.1\d* ± .*assumed/);
    expect(latex(real(0.1).times(2))).toContain("from a double");
  });

  it("both parts of a complex number, and every TeX output is read by a TeX reader", () => {
    const z = complex(real(2).sqrt(), real(3).sqrt().neg());
    expect(text(z)).toMatch(/^1\.4142\d+\.\.\. - 1\.7320\d+\.\.\. i$/);
    for (const value of [
      z,
      z.digits(5),
      complex(0, 1).times(real(2).sqrt()),
      real("1e-40"),
      [z, real(2).sqrt()],
      { z },
    ]) {
      expect(() => temml.renderToString(latex(value).slice(1, -1), { throwOnError: true })).not.toThrow();
    }
    expect(latex(z.digits(5))).toBe("$\\displaystyle 1.4142\\ldots - 1.7320\\ldots\\,i$");
  });

  it("tables align points and keep the uncertainty apart — oracle: written by hand", () => {
    const numbers = table([
      [real(2).sqrt().digits(8)],
      [real(-200).times(real(2).sqrt()).digits(5)],
      [enclose("1.25", "1e-6")],
    ]);
    expect(text(numbers)).toBe(["   1.4142135...", "-282.84...", "   1.25      ± 1e-6"].join("\n"));
  });

  it("a table wider than a page puts parts under each other, then breaks digits — oracle: the digits themselves", () => {
    const z = complex(agm(1, 2), agm(1, 3).neg());
    const html = (value: unknown) => bundle(value)?.["text/html"] as string;
    const breaks = (value: unknown) => html(value).match(/<br>/g)?.length ?? 0;
    expect(breaks(table([["z", z]]))).toBe(1);
    expect(html(table([["z", z]])).replace(/<[^>]*>/g, "")).toBe(
      `${text(z).replace(" - ", "−").replace("z", "")}`.replace(/^/, "z"),
    );
    const two = table([[agm(1, 2), agm(1, 3)]]);
    expect(breaks(two)).toBeGreaterThanOrEqual(2);
    expect(bare(latex(two)).replace(/&|\\begin\{array\}\{ll\}/g, "")).toContain(
      text(agm(1, 2)).replace("...", "\\ldots"),
    );
    expect(breaks(table([[agm(1, 2).digits(10), z.digits(10)]]))).toBe(0);
  });

  it("integers and infinity of the language are typeset", () => {
    expect(latex(12345)).toBe("$\\displaystyle 12\\,345$");
    expect(latex(Number.POSITIVE_INFINITY)).toBe("$\\displaystyle \\infty$");
    expect(latex(0.5)).toBeUndefined();
  });

  it("data carry every number as text", () => {
    const data = bundle([real("1/3"), 2n])?.["application/vnd.halfperiod.value+json"];
    expect(JSON.stringify(data)).not.toMatch(/:\s*-?\d/);
  });
});
