// Points of the lattice's plane in words: ω1/3, (ω1 + ω2)/2, 2ω1 − ω2.
import { gcd } from "../number/rational.ts";
import type { Coordinates } from "./torus.ts";

/** The point r ω1 + s ω2 with one common denominator. */
export function pointText([r, s]: Coordinates): string {
  const den = (r.den * s.den) / gcd(r.den, s.den);
  const [m, n] = [(r.num * den) / r.den, (s.num * den) / s.den];
  const top = latticePointText(m, n);
  if (den === 1n) return top;
  return m !== 0n && n !== 0n ? `(${top})/${den}` : `${top}/${den}`;
}

/** "0", "ω1", "2ω1 − ω2". */
export function latticePointText(m: bigint, n: bigint): string {
  const term = (k: bigint, name: string) =>
    k === 1n ? name : k === -1n ? `−${name}` : `${k}`.replace("-", "−") + name;
  if (m === 0n && n === 0n) return "0";
  if (m === 0n) return term(n, "ω2");
  if (n === 0n) return term(m, "ω1");
  return `${term(m, "ω1")} ${n < 0n ? "−" : "+"} ${term(n < 0n ? -n : n, "ω2")}`;
}
