/** x^n for n >= 1 by squarings and products, leading bit first. */
export function binaryPower<T>(x: T, n: number, square: (x: T) => T, times: (x: T, y: T) => T): T {
  let y = x;
  for (const bit of n.toString(2).slice(1)) {
    y = square(y);
    if (bit === "1") y = times(y, x);
  }
  return y;
}
