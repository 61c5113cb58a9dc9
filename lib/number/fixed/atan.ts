import { scaled, shift } from "./bits.ts";
import { oddSeries } from "./series.ts";
import { sinCosFixed } from "./trig.ts";

/**
 * atan(t/2^prec)·2^prec for 0 <= t <= 2^prec; error under 2 units: one of the last cut, and far less than one of the rest.
 *
 * Method   θ0 ≈ atan t from a fraction of the precision (at the bottom a double), s and c its sine and cosine,
 *          w = (t·c − s)/(c + t·s), atan t = θ0 + atan w.
 * Error    the identity holds for any θ0 near, so the start needs no bound. c and s err by two units each, which moves w by at
 *          most 6; the series for w errs by under N + 1 units; 16 guard bits hold all of it.
 */
export function atanFixed(t: bigint, prec: number): bigint {
  const work = prec + 16;
  const w = shift(work);
  const full = t << 16n;
  const start = atanStart(t, prec);
  const angle = scaled(start.value, work - start.prec);
  const { sin, cos } = sinCosFixed(angle, work);
  const top = full * cos - (sin << w);
  const bottom = (cos << w) + full * sin;
  return (angle + oddSeries((top << w) / bottom, w, -1n)) >> 16n;
}

interface Start {
  readonly value: bigint;
  readonly prec: number;
}

function atanStart(t: bigint, prec: number): Start {
  if (prec <= 400) {
    const guess = Math.atan(Number(scaled(t, 52 - prec)) * 2 ** -52);
    return { value: BigInt(Math.floor(guess * 2 ** 52)), prec: 52 };
  }
  const low = Math.ceil(prec / 7) + 16;
  const value = atanFixed(scaled(t, low - prec), low);
  return { value: value < 0n ? 0n : value, prec: low };
}
