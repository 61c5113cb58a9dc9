import temml from "temml";
import { describe, expect, it } from "vitest";
import { parseDecimal, plainDecimal, texDecimal, texInteger } from "../../../lib/page/digits.ts";
import { texName, texProse, texWords } from "../../../lib/page/tex.ts";

const parses = (tex: string) => temml.renderToString(tex, { throwOnError: true });

describe("TeX of words and names", () => {
  it("characters with a meaning in TeX stand outside \\text — oracle: a TeX reader takes all of ASCII", () => {
    const ascii = Array.from({ length: 95 }, (_, k) => String.fromCharCode(32 + k)).join("");
    const tex = texWords(ascii);
    expect(() => parses(tex)).not.toThrow();
    expect(tex.match(/\\text\{[^}]*\}/g)?.join("")).not.toMatch(/[$%&#_^~]/);
  });

  it("names of quantities are italic with an index, other names words", () => {
    expect(texName("g2")).toBe("g_{2}");
    expect(texName("ω1")).toBe("\\omega_{1}");
    expect(texName("omega_1")).toBe("\\omega_{1}");
    expect(texName("real period")).toBe("\\text{real period}");
    expect(texName("le")).toBe("\\text{le}");
    expect(texName("x_P")).toBe("x_{P}");
  });

  it("formulas between dollars stay, unless their braces do not balance", () => {
    expect(texProse("at $z_P$ only")).toBe("\\text{at }{z_P}\\text{ only}");
    expect(() => parses(texProse("a $}{$ b $5 and 6"))).not.toThrow();
  });
});

describe("TeX of digits", () => {
  it("groups of five behind the point, of three before it, from five digits on", () => {
    expect(texDecimal(parseDecimal("12345.1234567...")!)).toBe("12\\,345.12345\\,67\\ldots");
    expect(texDecimal(parseDecimal("-1234.5")!)).toBe("-1234.5");
    expect(texInteger("-1234567")).toBe("-1\\,234\\,567");
    expect(texDecimal(parseDecimal("1.25e-30 ± 2e-36")!)).toBe("1.25 \\cdot 10^{-30} \\pm 2 \\cdot 10^{-36}");
  });

  it("more than fifty digits go on in a second row, every digit in place — oracle: the digits themselves", () => {
    const digits = Array.from({ length: 137 }, (_, k) => String((k * 7) % 10)).join("");
    const tex = texDecimal(parseDecimal(`0.${digits}...`)!);
    expect(tex).toContain("\\begin{array}{l}");
    expect(() => parses(tex)).not.toThrow();
    const kept = tex
      .replace(/\\phantom\{[^}]*\}/g, "")
      .replace(/\\(begin|end)\{array\}(\{l\})?|\\,|\\\\|\\ldots|\s/g, "");
    expect(kept).toBe(`0.${digits}`);
  });

  it("text of a decimal is read back as it was", () => {
    for (const text of ["0.5", "-12.25...", "3", "1.25e-30 ± 1e-36", "0.1 ± 2e-9"]) {
      expect(plainDecimal(parseDecimal(text)!)).toBe(text);
    }
  });
});
