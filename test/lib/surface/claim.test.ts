import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { provedDigits } from "../../../lib/number/context.ts";
import { complex, enclose, real } from "../../../lib/number/convert.ts";
import { exp, ln } from "../../../lib/number/functions.ts";
import { recognise } from "../../../lib/number/recognise.ts";
import { i, π } from "../../../lib/number/symbols.ts";
import { Complex, type Real } from "../../../lib/number/values.ts";
import { bundle } from "../../../lib/page/bundle.ts";
import { standingText } from "../../../lib/page/standing.ts";
import { claim, conjunction } from "../../../lib/surface/claim.ts";
import { claimList } from "../../../lib/surface/claim-list.ts";
import { cubic } from "../../../lib/surface/make-cubic.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";

const before = provedDigits();
beforeEach(() => {
  provedDigits(50);
});
afterEach(() => {
  provedDigits(before);
});

// √n by way of the logarithm, so that no exact argument on radicals settles what is equal.
const [two, three, six] = [2, 3, 6].map((n) => exp(ln(real(n)).div(2))) as [Real, Real, Real];

describe("claims about numbers", () => {
  it("exact equals exact is proved, and refuted otherwise with both values", () => {
    expect(claim("a", real(2).sqrt().times(real(2).sqrt()), "=", 2).standing).toEqual({
      kind: "proved",
      argument: "exact arithmetic",
    });
    expect(claim("b", "1/3", "=", "0.3333").standing).toMatchObject({ kind: "refuted" });
    expect(claim("c", "1/3", "≠", "0.3333").standing.kind).toBe("proved");
    expect(claim("d", 5n, "≠", 5).standing.kind).toBe("refuted");
  });

  it("√2·√3 = √6 is certified to the digits asked for, never called equal — oracle: the identity", () => {
    const { standing } = claim("product", two.times(three), "=", six);
    expect(standing).toMatchObject({ kind: "certified", digits: 50 });
    provedDigits(80);
    expect(claim("product", two.times(three), "=", six).standing).toMatchObject({ kind: "certified", digits: 80 });
  });

  it("a difference in the 60th digit is found though 50 are asked for — oracle: made so by hand", () => {
    const { standing } = claim("near", two.times(three), "=", six.plus("1e-60"));
    expect(standing.kind).toBe("refuted");
    const evidence = standing.kind === "refuted" ? standing.evidence : "";
    // √6 = 2.44948...; the digits shown go just past the place where the sides part.
    const shown = evidence.match(/2\.4494\d+/g) ?? [];
    expect(shown.length).toBe(2);
    expect(shown[0]).not.toBe(shown[1]);
    expect(evidence).toContain("10^-6");
  });

  it("tiny numbers do not agree by being tiny, and agree in digits of their own", () => {
    const tiny = two.times(three).times("1e-80");
    expect(claim("t1", tiny, "=", six.times("2e-80")).standing.kind).toBe("refuted");
    expect(claim("t2", tiny, "=", six.times("1e-80")).standing).toMatchObject({ kind: "certified" });
    const { standing } = claim("t3", tiny, "=", six.times("1e-80"));
    expect(standing.kind === "certified" && standing.digits).toBeGreaterThanOrEqual(129);
  });

  it("large numbers are compared behind the point too", () => {
    const big = two.times(three).times("1e30");
    expect(claim("big", big, "=", six.times("1e30")).standing).toMatchObject({ kind: "certified", digits: 50 });
  });

  it("a residual that is 0 by an identity is certified against exact 0", () => {
    const residual = two.times(three).minus(six);
    expect(claim("zero", residual, "=", 0).standing).toMatchObject({ kind: "certified", digits: 50 });
    expect(claim("not zero", residual, "≠", 0).standing.kind).toBe("undecided");
    expect(claim("not below", residual, "<", 0).standing.kind).toBe("undecided");
  });

  it("order is proved by enclosures that are apart; equal exact numbers are at most each other", () => {
    expect(claim("o1", two, "<", three).standing.kind).toBe("proved");
    expect(claim("o2", three, "≤", two).standing.kind).toBe("refuted");
    expect(claim("o3", "1/2", "≤", "2/4").standing.kind).toBe("proved");
    expect(claim("o4", "1/2", "<", "2/4").standing.kind).toBe("refuted");
    expect(() => claim("o5", complex(0, 1), "<", 1)).toThrow(/real numbers/);
  });

  it("measured input certifies only what its radius allows", () => {
    const x = enclose("1.25", "1e-6");
    const { standing } = claim("m", x, "=", "1.2500003");
    expect(standing.kind).toBe("certified");
    expect(standing.kind === "certified" && standing.digits).toBeLessThanOrEqual(5);
    expect(claim("m2", x, "=", "1.26").standing.kind).toBe("refuted");
    expect(claim("m3", x, "≠", "1.26").standing.kind).toBe("proved");
    expect(claim("m4", enclose("1", "3"), "=", "2").standing.kind).toBe("undecided");
  });

  it("complex numbers: i·√2·√3 = √6·i", () => {
    expect(claim("i", complex(0, two).times(three), "=", complex(0, six)).standing.kind).toBe("certified");
  });
});

describe("claims about points, curves and lists", () => {
  const E = curve`y^2 + y = x^3 - x`;
  const P = E.point(0, 0);

  it("the group law: P + (−1, −1) = (2, −3) is proved — oracle: chord by hand", () => {
    expect(claim("sum", P.plus(E.point(-1, -1)), "=", E.point(2, -3)).standing.kind).toBe("proved");
    expect(claim("sum", P.plus(P), "=", E.point(2, -3)).standing.kind).toBe("refuted");
    expect(claim("inverse", P.plus(P.neg()), "=", E.origin).standing.kind).toBe("proved");
    expect(claim("not O", P, "≠", E.origin).standing.kind).toBe("proved");
  });

  it("on a curve by substitution, off it with the residual", () => {
    expect(claim("on", [1, 0], "on", E).standing.kind).toBe("proved");
    expect(claim("off", [1, 1], "on", E).standing).toMatchObject({ kind: "refuted" });
    expect(claim("point", P, "on", E).standing.kind).toBe("proved");
  });

  it("a point from the torus meets the exact one, and lies on the curve, to the digits asked for", () => {
    const back = E.exponential(E.logarithm(P));
    expect(claim("back", back, "=", P).standing).toMatchObject({ kind: "certified", digits: 50 });
    expect(claim("back", back, "=", P.neg()).standing.kind).toBe("refuted");
    expect(claim("on", back, "on", E).standing).toMatchObject({ kind: "certified" });
    expect(claim("off", [back.x, 1], "on", E).standing.kind).toBe("refuted");
  });

  it("real periods compare as real numbers", () => {
    expect(claim("period", E.lattice().periods[0], "<", 3).standing.kind).toBe("proved");
  });

  it("lists by their parts: the weakest counts, one refuted part refutes", () => {
    expect(claim("l", [two.times(three), 1], "=", [six, 1]).standing.kind).toBe("certified");
    expect(claim("l", [two.times(three), 1], "=", [six, 2]).standing.kind).toBe("refuted");
    expect(claim("l", [1, 2], "=", [1]).standing.kind).toBe("refuted");
    expect(claim("l", { a: 1, b: "1/2" }, "=", { b: "0.5", a: 1 }).standing.kind).toBe("proved");
    expect(claim("l", [1, 2], "≠", [1, 3]).standing.kind).toBe("proved");
  });

  it("curves are compared by their equations", () => {
    expect(claim("same", E, "=", curve({ a: [0, 0, 1, -1, 0] })).standing.kind).toBe("proved");
  });

  it("what cannot be compared is refused", () => {
    expect(() => claim("x", E, "=", 1)).toThrow(TypeError);
    expect(() => claim("x", 1, "on", 2)).toThrow(/"on" is not defined/);
  });
});

describe("claims on a page", () => {
  it("one line with its standing in words", () => {
    const shown = bundle(claim("product", two.times(three), "=", six));
    expect(shown?.["text/plain"]).toMatch(
      /^product: 2\.44948974278\.\.\. = 2\.44948974278\.\.\. {3}certified to 50 digits \(the sides agree within 10\^-50; computed with \d+ bits, again with \d+\)$/,
    );
    expect(shown?.["text/latex"]).toMatch(/^product: \$\\displaystyle .*\$ — certified to 50 digits .*\$10\^\{-50\}\$/);
    expect(shown?.["application/vnd.halfperiod.value+json"]).toMatchObject({
      kind: "claim",
      standing: { kind: "certified", digits: "50" },
    });
  });

  it("the list keeps the order of the first making", () => {
    claim("first", 1, "=", 1);
    claim("second", 1, "=", 1);
    claim("first", 1, "=", 1);
    const names = claimList().map(({ name }) => name);
    expect(names.filter((name) => name === "first").length).toBe(1);
    expect(names.indexOf("first")).toBeLessThan(names.indexOf("second"));
  });
});

describe("claims about lattices and functions", () => {
  const L = lattice({ invariants: [4, -1] });

  it("membership: proved by whole coordinates, certified by what is left, refuted with the distance", () => {
    expect(claim("in", L.at(2, -3), "in", L).standing.kind).toBe("proved");
    expect(claim("in", L.at("1/2", 0), "in", L).standing.kind).toBe("refuted");
    const w1 = Complex.from(L.periods[0]);
    expect(claim("in", w1.times(two).div(three).times(three).div(two), "in", L).standing.kind).toBe("certified");
    expect(claim("in", 1, "in", L).standing).toMatchObject({
      kind: "refuted",
      evidence: expect.stringContaining("distance of 1"),
    });
  });

  it("homothety: 2Λ is homothetic to Λ since j is the same, the square lattice is not — oracle: j", () => {
    expect(claim("h", L, "homothetic", lattice({ invariants: ["1/4", "-1/64"] })).standing.kind).toBe("proved");
    expect(claim("h", L, "homothetic", lattice({ tau: complex(0, 1) })).standing.kind).toBe("refuted");
  });

  it("a lattice is the same in another basis, and another one in twice its basis", () => {
    expect(claim("same", L, "=", lattice({ periods: L.reduced.periods })).standing.kind).toBe("certified");
    const [w1, w2] = L.periods;
    expect(claim("other", L, "=", lattice({ periods: [w1.times(2), w2] })).standing.kind).toBe("refuted");
  });

  it("the differential equation holds as an identity of functions: proved by normal forms", () => {
    const { wp } = L;
    const right = wp.pow(3).times(4).minus(wp.times(4)).plus(1);
    expect(claim("ode", wp.prime.pow(2), "=", right).standing.kind).toBe("proved");
    expect(claim("ode", wp.prime.pow(2), "=", right.plus(1)).standing.kind).toBe("refuted");
  });

  it("points of a plane cubic", () => {
    const C = cubic`u^3 + 2v^3 + 3w^3 = 6 u v w`;
    const P = C.point({ u: 1, v: 1, w: 1 });
    expect(claim("on", P, "on", C).standing.kind).toBe("proved");
    expect(claim("tangent", C.tangent(P).meets, "=", C.point({ u: -1, v: 2, w: -1 })).standing.kind).toBe("proved");
  });
});

describe("claims about answers that carry their ground", () => {
  const E = curve`y^2 + x y + y = x^3 - x^2 - 3x + 3`;

  it("a torsion subgroup by order, structure and name — oracle: the published group Z/7", () => {
    const group = E.torsion();
    for (const said of [7, 7n, [7], "Z/7"] as const) {
      const { standing } = claim("torsion", group, "=", said);
      expect(standing).toMatchObject({ kind: "proved", argument: expect.stringContaining("#E(F_3) = 7") });
    }
    expect(claim("torsion", group, "=", 14).standing).toMatchObject({ kind: "refuted" });
    expect(claim("torsion", group, "≠", 14).standing.kind).toBe("proved");
    expect(claim("member", group.generators[0], "in", group).standing.kind).toBe("proved");
    const F = curve`y^2 + y = x^3 - x`;
    expect(claim("stranger", F.point(0, 0), "in", F.torsion()).standing.kind).toBe("refuted");
  });

  it("complex multiplication by its discriminant, or none — oracle: j = 1728 and j = 110592/37", () => {
    const square = lattice({ tau: complex(0, 1) }).complexMultiplication();
    expect(claim("CM", square, "=", -4).standing).toMatchObject({ kind: "proved" });
    expect(claim("CM", square, "=", -3).standing.kind).toBe("refuted");
    const none = curve`y^2 + y = x^3 - x`.lattice().complexMultiplication();
    expect(claim("no CM", none, "=", "none").standing.kind).toBe("proved");
    expect(claim("CM", none, "=", -7).standing.kind).toBe("refuted");
    const seen = lattice({ periods: [π, π.times(i)] }).complexMultiplication();
    expect(claim("CM seen", seen, "=", -4).standing.kind).toBe("conjectured");
  });

  it("what was recognised stays a conjecture, with its evidence; nothing recognised is undecided", () => {
    const third = two.times(three).times(six).div(18);
    const { standing } = claim("a third", recognise(third), "=", "1/3");
    expect(standing).toMatchObject({ kind: "conjectured", evidence: expect.stringContaining("chance") });
    expect(claim("not a half", recognise(third), "=", "1/2").standing.kind).toBe("refuted");
    expect(claim("π", recognise(real(2).sqrt().sqrt(), { height: 10 }), "=", 1).standing.kind).toBe("undecided");
  });

  it("maps by their pull-back of the differential — oracle: a kernel has one normalised isogeny; dual after φ is [3]", () => {
    const phi = E.isogeny({ kernel: E.torsion().generators[0]! });
    expect(claim("same", phi, "=", E.isogenies()[0]!).standing.kind).toBe("proved");
    const F = curve`y^2 + x y + 2y = x^3`;
    const psi = F.isogeny({ kernel: F.point(0, 0) });
    const thrice = psi.dual().compose(psi);
    expect(claim("not the identity", thrice, "≠", F.isomorphism(F)!).standing.kind).toBe("proved");
  });

  it("a sublattice in its lattice, not the other way; homothetic curves — oracle: index 3 by hand", () => {
    const L = curve`y^2 = x^3 - x`.lattice();
    const M = L.overlattice(L.at("1/3", 0));
    expect(claim("sub", L, "in", M).standing).toEqual({
      kind: "proved",
      argument: "exact coordinates; the index is 3",
    });
    expect(claim("over", M, "in", L).standing.kind).toBe("refuted");
    expect(claim("twists", curve`y^2 = x^3 - x`, "homothetic", curve`y^2 = x^3 - 5x`).standing.kind).toBe("proved");
    expect(
      claim("τ", lattice({ tau: complex(0, 1) }), "homothetic", lattice({ tau: complex(1, 1) })).standing,
    ).toMatchObject({ kind: "proved" });
  });
});

describe("what was tried, and what was not repeated", () => {
  const long = (n: number) => {
    let x = two;
    for (let k = 0; k < n; k++) x = x.plus(three).minus(three);
    return x;
  };

  it("a value of more than 256 operations is not said to be repeated with more bits — oracle: the limit of the record", () => {
    const { standing } = claim("long", long(200), "=", two);
    expect(standing).toMatchObject({ kind: "certified", once: expect.stringContaining("256") });
    expect(standingText(standing)).not.toMatch(/again with/);
    expect(standingText(standing)).toContain("not repeated");
    expect(standingText(claim("short", long(20), "=", two).standing)).toMatch(/again with \d+\)/);
    expect(standingText(claim("open", long(200), "≠", two).standing)).not.toMatch(/16384/);
    expect(standingText(claim("open", two.times(three), "≠", six).standing)).toContain("16384 bits");
  });

  it("measured input that overlaps says so", () => {
    expect(claim("m", enclose("1.25", "1e-6"), "≠", "1.25").standing).toEqual({
      kind: "undecided",
      tried: "enclosures that overlap; the input is given no sharper",
    });
  });

  it("a conjunction is known as its weakest part, and refuted by one — oracle: the order of the standings", () => {
    const [a, b, c] = [claim("a", 1, "=", 1), claim("b", two.times(three), "=", six), claim("c", 1, "=", 2)];
    expect(conjunction("ab", a, b).standing).toMatchObject({ kind: "certified", digits: 50 });
    expect(conjunction("aa", a, a).standing).toMatchObject({ kind: "proved" });
    const all = conjunction("abc", a, b, c);
    expect(all.standing).toMatchObject({ kind: "refuted", evidence: expect.stringMatching(/^c: /) });
    expect(bundle(all)?.["text/plain"]).toMatch(/^abc: a and b and c {3}refuted \(c: /);
    expect(() => conjunction("none")).toThrow(TypeError);
  });

  it("two statements of one name stay beside each other; the same one again does not", () => {
    claim("twice", 3, "=", 4);
    claim("twice", 3, "=", 3);
    claim("twice", 3, "=", 3);
    expect(
      claimList()
        .filter(({ name }) => name === "twice")
        .map(({ standing }) => standing.kind),
    ).toEqual(["refuted", "proved"]);
  });
});
