// Every tabulated curve and the worked examples on curves, as a user reaches them.
import { describe, expect, it } from "vitest";
import { Rational } from "../../../lib/number/rational.ts";
import type { Real } from "../../../lib/number/values.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { quadrics } from "../../../lib/surface/make-quadrics.ts";
import data from "./tabulated.json" with { type: "json" };

interface Tabulated {
  readonly a: readonly number[];
  readonly torsion_generators?: readonly (readonly [string, string])[];
  readonly complex_multiplication?: number;
  readonly isogeny_class_size?: number;
  readonly bsd_period?: string;
  readonly real_components?: number;
  readonly generators?: readonly (readonly string[])[];
  readonly torsion_structure?: readonly number[];
}
const curves = data.curves as unknown as readonly Tabulated[];

function expectDigits(x: Real, printed: string): void {
  const digits = (printed.split(".")[1] ?? "").length - 1; // the last figure may be cut, not rounded
  const sharp = x.digits(digits + 8);
  const gap = sharp.minus(Rational.parse(printed)).abs();
  expect(gap.lessThan(Rational.parse(`1e-${digits}`))).toBe(true);
}

describe(`${curves.length} curves — oracle: Cremona, Algorithms for Modular Elliptic Curves, Tables 1 to 5`, () => {
  it("torsion: the listed generators have the listed orders and generate the group found", () => {
    for (const { a, torsion_generators: listed = [], torsion_structure: structure = [] } of curves) {
      const E = curve({ a });
      const group = E.torsion();
      expect(group.structure).toEqual(structure);
      const members = new Set([E.origin, ...group.points].map(String));
      for (const [x, y] of listed) expect(members.has(String(E.point(x, y)))).toBe(true);
      for (const P of group.points) expect(P.times(group.order).isOrigin).toBe(true);
    }
  });

  it("complex multiplication: the discriminant of the order, or none, by the exact j", () => {
    let found = 0;
    for (const { a, complex_multiplication: d } of curves) {
      if (d === undefined) continue;
      const ring = curve({ a }).endomorphismRing();
      expect(Number(ring.discriminant ?? 0n)).toBe(d);
      expect(ring.standing.kind).toBe("proved");
      if (d !== 0) found++;
    }
    expect(found).toBeGreaterThan(5);
  });

  it("the isogeny class has as many curves as listed", () => {
    let checked = 0;
    for (const { a, isogeny_class_size: size } of curves) {
      if (size === undefined) continue;
      expect(curve({ a }).isogenyClass().length).toBe(size);
      checked++;
    }
    expect(checked).toBeGreaterThan(100);
  }, 60_000);

  it("Ω = components · ω1 of the minimal model", () => {
    for (const { a, bsd_period: printed, real_components: components } of curves) {
      if (printed === undefined) continue;
      const E = curve({ a });
      expect(E.components).toBe(components);
      expectDigits(E.lattice().periods[0].re.times(E.components!), printed);
    }
  });

  it("the listed generators of infinite order are independent — proved by reduction", () => {
    let checked = 0;
    for (const { a, generators = [] } of curves) {
      if (generators.length === 0) continue;
      const E = curve({ a });
      const points = generators.map(([x, y]) => E.point(x!, y!));
      expect(E.relations(points).rank).toBe(points.length);
      checked++;
    }
    expect(checked).toBeGreaterThan(10);
  }, 60_000);
});

const worked = data.worked as unknown as readonly {
  readonly id: string;
  readonly quantity: string;
  readonly input: Readonly<Record<string, unknown>>;
  readonly expected: Readonly<Record<string, unknown>>;
  readonly source: string;
}[];

describe("worked periods and congruent numbers", () => {
  for (const { id, input, expected, source } of worked.filter((e) => e.quantity === "curve_periods")) {
    it(`${id} [${input.a_invariants}] — oracle: ${source.slice(0, 70)}`, () => {
      const E = curve({ a: input.a_invariants as readonly number[] });
      expect([String(E.c4), String(E.c6), E.components]).toEqual([expected.c4, expected.c6, expected.real_components]);
      const [w1, w2] = E.lattice().periods;
      expectDigits(w1.re, expected.real_period as string);
      const second = expected.second_period as { readonly re: string; readonly im: string };
      expectDigits(w2.im, second.im);
      if (/[1-9]/.test(second.re)) expectDigits(w2.re, second.re);
      else expect(w2.re.equals(0)).toBe(true);
    });
  }

  for (const { id, input, expected, source } of worked.filter((e) => e.quantity === "congruent_number")) {
    it(`${id} n = ${input.n} — oracle: ${source.slice(0, 70)}`, () => {
      const n = input.n as number;
      const [a, b, c] = (input.triangle as readonly string[]).map((text) => Rational.parse(text)) as [
        Rational,
        Rational,
        Rational,
      ];
      expect(a.times(a).plus(b.times(b)).equals(c.times(c)) && a.times(b).div(2).equals(n)).toBe(true);
      const E = curve({ a: expected.a_invariants as readonly number[] });
      const [x, y] = expected.point as [string, string];
      const P = E.point(x, y);
      expect(P.order()).toBe(Infinity);
      expect(E.minimal().curve.a.map(String)).toEqual((expected.minimal_model as readonly number[]).map(String));
      // The same from the squares (c/2)² ± n of an arithmetic progression, two quadrics in space.
      const C = quadrics`u^2 + ${n} v^2 = s^2, u^2 - ${n} v^2 = t^2`;
      const through = C.through({ u: 1, v: 0, s: 1, t: 1 });
      expect(through.curve.equals(E.minimal().curve)).toBe(true);
      const R = C.point({ u: c.div(2), v: 1, s: a.plus(b).div(2), t: a.minus(b).abs().div(2) });
      expect(through.to(R).order()).toBe(Infinity);
      expect(E.relations([P, ...(through.curve.equals(E) ? [through.to(R)] : [])]).rank).toBe(1);
    });
  }
});
