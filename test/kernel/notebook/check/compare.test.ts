import { describe, expect, it } from "vitest";
import { compareNotebooks } from "../../../../kernel/notebook/check/cells.ts";
import { compareData } from "../../../../kernel/notebook/check/data.ts";
import type { Cell, Notebook, Output } from "../../../../kernel/notebook/format.ts";
import { VALUE_TYPE } from "../../../../kernel/notebook/values.ts";

const real = (middle: string, radius: string) => ({ kind: "real", standing: "defined", middle, radius });
const complex = (re: string, im: string, radius: string) => ({ kind: "complex", standing: "defined", re, im, radius });
const rational = (value: string) => ({ kind: "rational", value });
const claim = (standing: object, name = "c") => ({
  kind: "claim",
  name,
  lhs: rational("1"),
  relation: "=",
  rhs: rational("1"),
  standing,
});
const finding = (stored: unknown, fresh: unknown, digits?: number) =>
  compareData(stored, fresh, "value", digits).finding;
const notes = (stored: unknown, fresh: unknown) => compareData(stored, fresh).notes.join("\n");

describe("numbers compared by what they are", () => {
  // 0.12345678901234567890 to 20 digits, and neighbours.
  const x = real("12345678901234567890e-20", "1e-20");

  it("same: overlapping enclosures of like sharpness, an exact value in both forms", () => {
    expect(finding(x, real("12345678901234567891e-20", "1e-20"))).toBe("same");
    expect(finding(rational("1/2"), rational("1/2"))).toBe("same");
    expect(finding(real("5e-1", "1e-30"), rational("1/2"))).toBe("same");
  });

  it.each([43429448190, -43429448190, 3_000_000, -1_000_001])(
    "numbers of size 10^%i as any others: same, weaker, differs, sign, factor two — oracle: the digits",
    (e) => {
      const at = (digits: string, radius: string) => real(`${digits}e${e}`, `${radius}e${e}`);
      expect(finding(at("2114", "1"), at("2115", "1"))).toBe("same");
      expect(finding(at("2114", "1"), at("2117", "1"))).toBe("differs");
      expect(finding(at("2114000000", "1"), at("2114500000", "900000"))).toBe("weaker");
      expect(notes(at("2114", "1"), at("-2114", "1"))).toContain("the sign changed");
      expect(notes(at("2114", "1"), at("4228", "1"))).toContain("it is twice as large");
      expect(finding(at("2114", "1"), real("2114", "1"))).toBe("differs");
      expect(finding(at("2114", "1"), rational("1/3"))).toBe("differs");
      const pair = (re: string, im: string) => complex(`${re}e${e}`, `${im}e${e}`, `1e${e}`);
      expect(finding(pair("2114", "-5"), pair("2115", "-5"))).toBe("same");
      expect(notes(pair("2114", "-5"), pair("2114", "5"))).toContain("it is the complex conjugate");
    },
  );

  it("a part far below the other one counts within the radius", () => {
    const x = complex("1e0", "1e-43429448190", "0");
    expect(finding(x, complex("1e0", "0", "0"))).toBe("same");
    expect(finding(x, complex("2e0", "1e-43429448190", "0"))).toBe("differs");
    expect(finding(real("1e", "1"), real("1e5", "1"))).toBe("differs");
  });

  it("same: a quadratic number whose fields the file keeps in another order", () => {
    const [stored, fresh] = [
      { a: "0", b: "1/5", d: "35", kind: "quadratic" },
      { kind: "quadratic", a: "0", b: "1/5", d: "35" },
    ];
    expect(finding(stored, fresh)).toBe("same");
  });

  it("same: a root that was stored by its decimals and is exact now; weaker the other way — oracle: √2, i√3", () => {
    const exactly = (a: string, b: string, d: string) => ({ kind: "quadratic", a, b, d });
    const decimals = real("141421356237309504880e-20", "1e-20");
    expect(finding(decimals, exactly("0", "1", "2"))).toBe("same");
    expect(finding(exactly("0", "1", "2"), decimals)).toBe("weaker");
    expect(finding(decimals, exactly("0", "1", "3"))).toBe("differs");
    expect(finding(complex("0", "17320508e-7", "1e-7"), exactly("0", "1", "-3"))).toBe("same");
    expect(finding(exactly("0", "1", "2"), exactly("1/1000", "1", "2"))).toBe("differs");
  });

  it("differs: one digit within the proved ones, an exact value changed, enclosures just apart", () => {
    expect(finding(x, real("12345678901234567990e-20", "1e-20"))).toBe("differs");
    expect(finding(rational("1/2"), rational("1/3"))).toBe("differs");
    expect(finding(x, real("12345678901234567893e-20", "1e-20"))).toBe("differs");
    expect(finding({ kind: "quadratic", a: "1", b: "1", d: "5" }, { kind: "quadratic", a: "1", b: "-1", d: "5" })).toBe(
      "differs",
    );
  });

  it("weaker, not same: an enclosure so wide that it can only overlap — unless fewer digits were asked for", () => {
    expect(finding(x, real("1e-1", "1e-1"))).toBe("weaker");
    expect(finding({ ...real("1e-1", "1e-1"), standing: "defined" }, x)).toBe("weaker");
    expect(finding({ ...real("0", "1e-40"), standing: "defined" }, real("0", "1e-80"))).toBe("same");
    expect(finding(x, real("1234567890e-10", "1e-10"))).toBe("weaker");
    expect(finding(x, real("1234567890e-10", "1e-10"), 10)).toBe("same");
    expect(finding(rational("1/2"), real("5e-1", "1e-30"))).toBe("weaker");
    expect(finding(x, real("123456789012345678901234567890e-30", "1e-30"))).toBe("same");
  });

  it("measures complex distances by squares: 3, 4, 5", () => {
    const origin = complex("0", "0", "2");
    expect(finding(origin, complex("3", "4", "3"))).not.toBe("differs");
    expect(finding(origin, complex("3", "4", "299e-2"))).toBe("differs");
  });

  it("names what changed: sign, conjugate, factor two, order", () => {
    expect(notes(x, real("-12345678901234567890e-20", "1e-20"))).toContain("the sign changed");
    expect(notes(complex("1", "2", "1e-9"), complex("1", "-2", "1e-9"))).toContain("complex conjugate");
    expect(notes(rational("1/2"), rational("1"))).toContain("twice as large");
    expect(notes([x, rational("2")], [rational("2"), x])).toBe("value: the same values in another order");
    expect(notes(rational("1/2"), real("12345e-5", "1e-5"))).toBe("value: was 1/2, is 0.12345");
  });
});

describe("words that hold decimals", () => {
  const label = (text: string) => ({ kind: "figure", points: { P: text } });
  it("same: a decimal that goes on, to more or fewer digits as asked", () => {
    expect(finding(label("P = 1.41421..."), label("P = 1.41422..."))).toBe("same");
    expect(finding(label("P = 1.41421..."), label("P = 1.41421356..."))).toBe("same");
    expect(finding(label("P = 1.41421356..."), label("P = 1.4142..."), 5)).toBe("same");
    expect(finding("certified to 50 digits", "certified to 30 digits", 30)).toBe("same");
  });

  it("weaker or different: digits lost unasked, a digit changed, an exact number or a word changed", () => {
    expect(finding(label("P = 1.41421356..."), label("P = 1.4142..."))).toBe("weaker");
    expect(finding("certified to 50 digits", "certified to 30 digits")).toBe("weaker");
    expect(finding(label("P = 1.41421..."), label("P = 1.41521..."))).toBe("differs");
    expect(finding(label("(0, 0)"), label("(0, 1)"))).toBe("differs");
    expect(finding(label("P = 1.5"), label("Q = 1.5"))).toBe("differs");
  });
});

describe("periods", () => {
  const point = (re: string, im: string) => ({
    kind: "point of a torus",
    coordinates: ["1", "0"],
    value: complex(re, im, "1e-20"),
  });
  const lattice = (...periods: object[]) => ({ kind: "lattice", periods });
  it("name another basis of the same lattice, and no other", () => {
    const stored = lattice(point("2", "0"), point("0", "3"));
    expect(notes(stored, lattice(point("0", "3"), point("-2", "0")))).toContain(
      "the same lattice in another basis, first = 0·ω1 + 1·ω2, second = -1·ω1 + 0·ω2",
    );
    expect(notes(stored, lattice(point("2", "0"), point("2", "3")))).toContain("second = 1·ω1 + 1·ω2");
    expect(notes(stored, lattice(point("4", "0"), point("0", "3")))).not.toContain("same lattice");
    expect(notes(stored, lattice(point("2", "0"), point("0", "31e-1")))).not.toContain("same lattice");
  });
});

describe("claims", () => {
  const certified = (digits: string) => claim({ kind: "certified", digits, bits: "200" });
  it("may keep or improve their standing", () => {
    expect(finding(certified("50"), certified("50"))).toBe("same");
    expect(finding(certified("50"), claim({ kind: "proved", argument: "exact" }))).toBe("same");
    expect(finding(certified("50"), certified("80"))).toBe("same");
  });

  it("are weaker with a lower standing or fewer digits, and differ when refuted", () => {
    expect(finding(certified("50"), certified("30"))).toBe("weaker");
    expect(compareData(certified("50"), certified("30"), "value", 30).finding).toBe("same");
    expect(finding(certified("50"), claim({ kind: "undecided", tried: "much" }))).toBe("weaker");
    expect(finding(certified("50"), claim({ kind: "refuted", evidence: "digit 3" }))).toBe("differs");
    expect(notes(certified("50"), claim({ kind: "refuted", evidence: "digit 3" }))).toContain("is refuted (digit 3)");
  });
});

describe("notebooks", () => {
  const cell = (source: string, count: number | null, outputs: Output[] = [], tags: string[] = []): Cell => ({
    cell_type: "code",
    metadata: { tags },
    source,
    execution_count: count,
    outputs,
  });
  const value = (data: unknown, text = "t"): Output => ({
    output_type: "execute_result",
    execution_count: 1,
    data: { "text/plain": text, [VALUE_TYPE]: data },
    metadata: {},
  });
  const said = (text: string): Output => ({ output_type: "stream", name: "stdout", text });
  const notebook = (...cells: Cell[]): Notebook => ({ nbformat: 4, nbformat_minor: 5, metadata: {}, cells });
  const findings = (stored: Cell[], fresh: Cell[]) =>
    compareNotebooks(notebook(...stored), notebook(...fresh)).map((one) => one.finding);

  it("reads values, not typeset text: other words for the same value are the same", () => {
    expect(
      findings([cell("a", 1, [value(rational("1/2"), "1/2")])], [cell("a", 1, [value(rational("1/2"), "half")])]),
    ).toEqual(["same"]);
  });

  it("compares printed text where there is no data, and fails only where the cell asks for it", () => {
    expect(findings([cell("a", 1, [said("1\n")])], [cell("a", 1, [said("2\n")])])).toEqual(["other words"]);
    expect(findings([cell("a", 1, [said("1\n")], ["same-words"])], [cell("a", 1, [said("2\n")])])).toEqual(["differs"]);
  });

  it("notices a cell that now fails, one behind it, one without results, a lost output", () => {
    const error: Output = { output_type: "error", ename: "E", evalue: "v", traceback: [] };
    const good = cell("a", 1, [value(rational("1"))]);
    expect(findings([good, good], [cell("a", 1, [error]), cell("a", null)])).toEqual(["fails", "fails"]);
    expect(findings([cell("a", null)], [good])).toEqual(["differs"]);
    expect(findings([good], [cell("a", 1)])).toEqual(["differs"]);
    expect(findings([cell("a", 1, [error], ["raises-exception"])], [cell("a", 1, [error])])).toEqual(["same"]);
  });

  it("compares figures by their facts", () => {
    const figure = (place: string) => value({ kind: "figure", figure: "curve", points: { P: place } });
    expect(findings([cell("a", 1, [figure("(0, 0)")])], [cell("a", 1, [figure("(0, 0)")])])).toEqual(["same"]);
    const [verdict] = compareNotebooks(
      notebook(cell("a", 1, [figure("(0, 0)")])),
      notebook(cell("a", 1, [figure("(0, 1)")])),
    );
    expect(verdict).toMatchObject({ finding: "differs", notes: ["figure.points.P: was (0, 0), is (0, 1)"] });
  });
});
