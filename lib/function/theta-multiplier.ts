// How theta functions and η change along a word of τ + n and −1/τ.
//
//     θ1(v|τ) = e^(−πi/4) θ1(v|τ+1), θ2 likewise, θ3 and θ4 change places                               (DLMF 20.7.26–29)
//     √(−iτ) θ1(v|τ) = i E θ1(v/τ | −1/τ), and √(−iτ) θ_j(v|τ) = E θ_j′(v/τ | −1/τ) with 2 and 4 changing places,
//     E = exp(−πi v²/τ), the root with positive real part                                             (DLMF 20.7.30–33)
//     η(τ) = e^(−πi/12) η(τ+1),  √(−iτ) η(τ) = η(−1/τ)                                                (DLMF 23.18.5)
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import type { Letter } from "./modular-action.ts";

export type ThetaIndex = 1 | 2 | 3 | 4;

/**
 * θ_j(v|τ) = e^(2πi·eighths/8) · exp(−πi c v²/(cτ+d)) / root · θ_index(v/(cτ+d) | Mτ), with M, cτ + d and root of the reduction.
 */
export interface ThetaMultiplier {
  readonly index: ThetaIndex;
  /** 0 .. 7. */
  readonly eighths: number;
}

const AFTER_SHIFT: readonly ThetaIndex[] = [1, 2, 4, 3];
const AFTER_TURN: readonly ThetaIndex[] = [1, 4, 3, 2];

export function thetaMultiplier(word: readonly Letter[], j: ThetaIndex): ThetaMultiplier {
  let index = j;
  let eighths = 0;
  for (const letter of word) {
    if (letter.kind === "turn") {
      if (index === 1) eighths += 2;
      index = AFTER_TURN[index - 1]!;
    } else {
      if (index <= 2) eighths -= Number(BigInt.asUintN(3, letter.by));
      if (letter.by & 1n) index = AFTER_SHIFT[index - 1]!;
    }
  }
  return { index, eighths: ((eighths % 8) + 8) % 8 };
}

/** The e in 0 .. 23 with η(τ) = e^(2πi·e/24) η(Mτ)/root. */
export function etaTwentyFourths(word: readonly Letter[]): number {
  let e = 0n;
  for (const letter of word) if (letter.kind === "shift") e -= letter.by;
  return Number(((e % 24n) + 24n) % 24n);
}

/** exp(2πi·k/8). */
export function eighthRoot(k: number, wp: number): Disc {
  const quarter = k >> 1;
  let value: Disc = disc.one;
  if (k & 1) {
    const half = ball.sqrt({ man: 1n, exp: -1, rad: 0 }, wp);
    value = disc.fromBalls(half, half);
  }
  for (let n = 0; n < quarter; n++) value = disc.mulI(value);
  return value;
}
