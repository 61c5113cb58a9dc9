// ln and arg in fixed point, by one exponential at full length after a start at a fraction of it.
import { scaled, shift } from "./bits.ts";
import { expFixed } from "./exp.ts";
import { oddSeries } from "./series.ts";

/**
 * ln(y/2^prec)·2^prec for 2^prec <= y < 2^(prec+1); error under 2 units: one of the last cut, and far less than one of the rest.
 *
 * Method   L0 ≈ ln y from a fraction of the precision (at the bottom a double), E = exp(L0), z = (y − E)/(y + E),
 *          ln y = L0 + 2 artanh z.
 * Error    the identity holds for any L0, so the start needs no bound: only |z| enters, and is looked at. E errs by two units
 *          of a number >= 1, the series by under N + 3; 16 guard bits hold all of it.
 */
export function lnFixed(y: bigint, prec: number): bigint {
  const work = prec + 16;
  const w = shift(work);
  const full = y << 16n;
  const start = lnStart(y, prec);
  const e = expFixed(scaled(start.value, work - start.prec), work);
  const z = ((full - e) << w) / (full + e);
  const value = scaled(start.value, work - start.prec) + 2n * oddSeries(z, w, 1n);
  return value >> 16n;
}

interface Start {
  readonly value: bigint;
  readonly prec: number;
}

function lnStart(y: bigint, prec: number): Start {
  if (prec <= 400) {
    const guess = Math.log(Number(scaled(y, 52 - prec)) * 2 ** -52);
    return { value: BigInt(Math.max(0, Math.floor(guess * 2 ** 52))), prec: 52 };
  }
  const low = Math.ceil(prec / 7) + 16;
  const value = lnFixed(scaled(y, low - prec), low);
  return { value: value < 0n ? 0n : value, prec: low };
}
