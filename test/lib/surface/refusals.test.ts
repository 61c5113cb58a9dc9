// What is asked of curves and must be refused: each message says what was given, what was expected, what to do.
import { describe, expect, it } from "vitest";
import { rational } from "../../../lib/number/convert.ts";
import { quadratic } from "../../../lib/number/quadratic.ts";
import { BranchError, DomainError, PoleError, PrecisionError, UndecidedError } from "../../../lib/proof/errors.ts";
import { homothety } from "../../../lib/surface/homothety.ts";
import { cubic } from "../../../lib/surface/make-cubic.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";
import { quartic } from "../../../lib/surface/make-quartic.ts";

const E = curve`y^2 + y = x^3 - x`;
const weighted = cubic`u^3 + 2v^3 + 3w^3 = 6u v w`;
const third = curve`y^2 + x y + 2y = x^3`;
const foreign = curve`y^2 = x^3 - x`;
const halved = foreign.isogeny({ kernel: foreign.point(0, 0) });

const REQUESTS: readonly (readonly [string, () => unknown, string | RegExp])[] = [
  // The weighted cubic.
  [
    "a point that is not on the cubic, with F(1, 1, 2) = 15",
    () => weighted.through({ u: 1, v: 1, w: 2 }),
    /is 15 there; expected 0/,
  ],
  [
    "three lines, singular at the given point",
    () => cubic`u^3 + v^3 + w^3 = 3u v w`,
    /singular at \(1 : 1 : 1\), a node with conjugate tangents \(nonsplit\).*contains the line u \+ v \+ w = 0.*three lines/s,
  ],
  // Torsion in a bad model.
  [
    "a point moved by 10^-30",
    () =>
      curve`y^2 = x^3 - (30625/768)x + 1850640625/55296`.point("4225/48", rational("3375/4").plus(rational("1e-30"))),
    /is not on .* there .* is 1687500000000000000000000000000001\/10+; expected 0/,
  ],
  // Complex multiplication.
  [
    "a homothety of lattices with different j",
    () => homothety(curve`y^2 = x^3 - 595x - 5586`.lattice(), foreign.lattice()),
    /j = 16581375 and j = 1728; expected lattices with the same j/,
  ],
  // A third of a period.
  [
    "a number near a third of a period",
    () => third.isogeny({ kernel: third.lattice().periods[0].div(3).plus("1e-9") }),
    /3-fold differs from a period by 3\.0000/,
  ],
  [
    "the index in a lattice that does not contain the other",
    () =>
      third.lattice().indexIn(
        third.lattice().sublattice([
          [2, 0],
          [0, 1],
        ]),
      ),
    /coordinates \(1\/2, 0\) and \(0, 1\) in the other lattice; expected integers/,
  ],
  // Equations.
  ["degree 5", () => curve`y^2 = x^5 - x`, /degree 5.*Its genus is not 1/s],
  ["a conic", () => curve`x^2 + y^2 = 1`, /degree 2: a line or a conic, of genus 0/],
  ["a quartic as a curve", () => curve`y^2 = x^4 + 1`, /Give it as quartic`...`/],
  ["an equation of Edwards type as a curve", () => curve`x^2 + y^2 = 1 + 3x^2y^2`, /Give it as biquadratic`...`/],
  ["one of degree 4 as a cubic", () => cubic`x^4 + y^4 = 1`, /of degree 4 in 2 letters; expected .* degree 3/],
  ["a cubic as a quartic", () => quartic`x^3 + y^3 = 1`, /expected y\^2 = a\*x\^4/],
  ["a quartic with a double root", () => quartic`y^2 = x^4 - 2x^2 + 1`, /double root.*genus 0/s],
  ["a line in a curve", () => curve`(x + y)(x^2 + y^2 - 1) = 0`, /contains the line x \+ y = 0.*no curve of genus 1/s],
  ["a line in a cubic", () => cubic`(x + y)(x^2 + y^2 - 3)`, /contains the line x \+ y = 0; the rest is a conic/],
  ["three rational lines", () => cubic`x y (x - y - 1)`, /lines x = 0 and y = 0 and x - y - z = 0/],
  ["a split node", () => cubic`y^2 = x^3 + x^2`, /\(split\).*smooth part.*the multiplicative group of Q/s],
  ["a nonsplit node", () => cubic`y^2 = x^3 - 2x^2`, /\(nonsplit\).*elements of norm 1 in Q\(√-2\)/s],
  ["a cusp", () => cubic`(y - x)^2 = x^3`, /a cusp.*the additive group of Q/s],
  [
    "numbers of two quadratic fields",
    () => curve`y^2 = x^3 + ${quadratic(2)}x + ${quadratic(3)}`,
    /√2 of Q\(√2\) and √3 of Q\(√3\); expected numbers of one quadratic field.*real\(x\)/,
  ],
  ["a root that the field does not have", () => curve`y^2 = x^3 + √2 x`, /√2 is not in Q at column 13/],
  ["a letter too many", () => curve`y^2 = x^3 + k x`, /unknown letter k.*Insert a number as \$\{k\}/s],
  ["two readings", () => curve`y^2 = x^3 + 1/2x`, /has two readings at column 13/],
  // Points and fields.
  [
    "a coordinate of another field",
    () => E.point(quadratic(2) as never, 0),
    /x = √2, a number of Q\(√2\), on a curve over Q/,
  ],
  ["a double", () => E.point(0.1, 0), /x = 0\.1; expected an exact number/],
  ["a coordinate of O", () => E.origin.x, /the point O at infinity/],
  [
    "points of two curves",
    () => E.point(0, 0).plus(foreign.point(0, 0)),
    /y\^2 \+ y = x\^3 - x over Q and a point of y\^2 = x\^3 - x over Q/,
  ],
  [
    "points over F_5 and F_7",
    () => foreign.mod(5).point(0, 0).plus(foreign.mod(7).point(0, 0)),
    /over F_5 and a point of .* over F_7/,
  ],
  ["the order of an enclosure", () => E.over("R").pointsWith({ x: 2 })[0]!.order(), /expected exact coordinates/],
  ["periods over F_p", () => E.mod(5).lattice(), /A curve over a finite field has no periods/],
  ["a count over Q", () => E.count, /Reduce it first: E\.mod\(p\)/],
  ["4 for a prime", () => E.mod(4), /expected a prime/],
  ["bad reduction", () => E.mod(37), /a nonsplit node at \(5, 18\) over F_37/],
  // Kernels and maps.
  [
    "points that are no subgroup",
    () => third.isogeny({ kernel: [third.point(0, 0)] }),
    /\(0, 0\) \+ \(0, 0\) = \(0, -2\), which is not among/,
  ],
  ["a kernel of infinite order", () => E.isogeny({ kernel: E.point(0, 0) }), /\(0, 0\), of infinite order/],
  ["a kernel on another curve", () => E.isogeny({ kernel: foreign.point(0, 0) }), /expected points of y\^2 \+ y/],
  [
    "a kernel that is not rational",
    () => third.isogeny({ kernel: third.lattice().at("1/3", "1/3") }),
    /expected a subgroup that is defined over Q/,
  ],
  [
    "the inverse of an isogeny",
    () => halved.inverse,
    /an isogeny of degree 2; expected an isomorphism. An isogeny has a dual/,
  ],
  ["maps that do not meet", () => halved.compose(halved), /expected maps that meet on one curve/],
  ["a point of another curve in a map", () => halved(E.point(0, 0)), /expected a point of y\^2 = x\^3 - x over Q/],
  [
    "a Weil pairing of points that n does not kill",
    () => E.weilPairing(3, E.point(0, 0), E.point(1, 0)),
    /which 3 does not kill/,
  ],
  ["a twist by 0", () => E.twist(0), /expected a number that is not 0/],
];

describe("refusals — oracle: the reason named in each title", () => {
  it.each(REQUESTS)("%s", (_, request, words) => {
    const kinds = [DomainError, PoleError, BranchError, PrecisionError, UndecidedError];
    let error: unknown;
    try {
      request();
    } catch (caught) {
      error = caught;
    }
    expect(kinds.some((kind) => error instanceof kind)).toBe(true);
    const { message, given, expected } = error as DomainError;
    expect(message).toMatch(words);
    expect(message).not.toMatch(/NaN|undefined|\[object/);
    expect(given.length > 0 && expected.length > 0).toBe(true);
  });

  it("digits alone do not decide complex multiplication; the exact j does", () => {
    const g = rational("38811960000027/1428840000001");
    const decoy = curve`y^2 = 4x^3 - ${g}x - ${g}`.lattice();
    // τ as measured to 11 digits agrees with 2i.
    const measured = lattice({ tau: "2.00000000000 i ± 1e-11" as never }).complexMultiplication();
    expect([measured.outcome, measured.standing.kind]).toEqual(["consistent", "conjectured"]);
    const exact = decoy.complexMultiplication();
    expect([exact.outcome, exact.standing.kind]).toEqual(["no", "proved"]);
    expect(exact.reason).toContain("not an algebraic integer");
  });

  it("the Jacobian of a cubic without a given point says that it is only that", () => {
    const J = weighted.jacobian();
    expect(J.notice).toMatch(/only the Jacobian: isomorphic to the given curve if and only if that has a point over Q/);
    expect(weighted.through({ u: 1, v: 1, w: 1 }).curve.notice).toBe(undefined);
    expect(quartic`y^2 = 2x^4 + 3`.jacobian().notice).toContain("only the Jacobian");
  });

  it("points over fields without a common one do not add at check time", () => {
    const P = foreign.point(0, 0);
    const R = foreign.mod(7).point(0, 0);
    // @ts-expect-error a point over Q and one over F_7
    expect(() => P.plus(R)).toThrow(DomainError);
    // @ts-expect-error the same for differences
    expect(() => R.minus(P)).toThrow(DomainError);
    expect(P.plus(foreign.over("R").point(0, 0)).isOrigin).toBe(true);
  });
});
