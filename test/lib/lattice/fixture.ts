// Reading fixtures and asking whether an enclosure agrees with a printed value and is narrow.
import { readFileSync } from "node:fs";
import { expect } from "vitest";
import type { ExactComplex } from "../../../lib/lattice/quantity.ts";
import * as ball from "../../../lib/number/ball.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";

export type Printed = string | { readonly re: string; readonly im: string };

export interface Entry {
  readonly id: string;
  readonly quantity: string;
  // biome-ignore lint/suspicious/noExplicitAny: fixtures differ by quantity
  readonly input: any;
  // biome-ignore lint/suspicious/noExplicitAny: fixtures differ by quantity
  readonly expected: any;
  readonly digits: number;
}

export function entries(name: string, quantity?: string): Entry[] {
  const file = JSON.parse(readFileSync(new URL(name, import.meta.url), "utf8")) as { entries: Entry[] };
  return quantity ? file.entries.filter((entry) => entry.quantity === quantity) : file.entries;
}

/** A printed input as an exact number. */
export function exact(printed: Printed): ExactComplex {
  const [re, im] = typeof printed === "string" ? [printed, "0"] : [printed.re, printed.im];
  return { real: Rational.parse(re), imag: Rational.parse(im), root: 1n };
}

export function toDisc(printed: Printed, prec: number): Disc {
  const { real, imag } = exact(printed);
  return disc.fromRational(real, prec, imag);
}

/**
 * The enclosure meets the printed value with its last digit uncertain by one unit, and its radius is under `limit` units of
 * 10^-digits of the larger part.
 */
export function expectHolds(got: Disc, printed: Printed, digits: number, limit = 1): void {
  const parts = typeof printed === "string" ? [printed, "0"] : [printed.re, printed.im];
  const values = parts.map((part) => Rational.parse(part));
  const size = values.map((x) => x.abs()).reduce((x, y) => (x.compare(y) > 0 ? x : y));
  const places = digits - leading(size);
  const unit = Rational.of(1, 10n ** BigInt(Math.max(places, 0))).times(
    Rational.of(10n ** BigInt(Math.max(-places, 0))),
  );
  const slack = ball.fromRational(unit.times(Rational.of(3, 2)), 64);
  const [re, im] = values.map((x) => ball.widenBy(ball.fromRational(x, 500), slack, 520));
  const text = () => `${ball.toDouble(disc.real(got))} ${ball.toDouble(disc.imag(got))} against ${parts.join(" ")}`;
  expect(ball.overlaps(disc.real(got), re!), text()).toBe(true);
  expect(ball.overlaps(disc.imag(got), im!), text()).toBe(true);
  const radius = got.rad === 0 ? ball.zero : { man: BigInt(Math.ceil(got.rad)), exp: got.exp, rad: 0 };
  const wide = ball.compare(radius, ball.fromRational(unit.times(limit), 64));
  expect(wide, `radius of ${text()}`).toBe(-1);
}

/** The number of digits before the point (0.05 has -1). */
function leading(x: Rational): number {
  if (x.sign() === 0) return 1;
  let n = 0;
  const ten = Rational.of(10);
  let y = x;
  while (y.compare(1) >= 0) {
    y = y.div(ten);
    n++;
  }
  while (y.times(ten).compare(1) < 0) {
    y = y.times(ten);
    n--;
  }
  return n;
}
