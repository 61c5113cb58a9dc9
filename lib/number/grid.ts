// The double-precision lane for pictures: complex numbers over a grid as two Float64Arrays. Nothing here is proved: no result of it may be printed as digits.
import { DomainError } from "../proof/errors.ts";

/** Real and imaginary parts, row by row. */
export interface Grid {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

export interface Window {
  readonly re: readonly [number, number];
  readonly im: readonly [number, number];
  readonly columns: number;
  readonly rows: number;
}

export function emptyGrid(length: number): Grid {
  return { re: new Float64Array(length), im: new Float64Array(length) };
}

/** The points of a window: columns from left to right, rows from the top down, both ends included. */
export function gridOf({ re, im, columns, rows }: Window): Grid {
  if (!(Number.isSafeInteger(columns) && Number.isSafeInteger(rows) && columns > 1 && rows > 1)) {
    throw new DomainError({
      subject: "grid",
      given: `${columns} columns and ${rows} rows`,
      expected: "two or more of each",
    });
  }
  const out = emptyGrid(columns * rows);
  for (let row = 0, k = 0; row < rows; row++) {
    const y = im[1] + ((im[0] - im[1]) * row) / (rows - 1);
    for (let column = 0; column < columns; column++, k++) {
      out.re[k] = re[0] + ((re[1] - re[0]) * column) / (columns - 1);
      out.im[k] = y;
    }
  }
  return out;
}

/** out = x + y; `out` may be x or y in all of these. */
export function gridAdd(x: Grid, y: Grid, out: Grid): Grid {
  for (let k = 0; k < out.re.length; k++) {
    out.re[k] = x.re[k]! + y.re[k]!;
    out.im[k] = x.im[k]! + y.im[k]!;
  }
  return out;
}

/** out = x − y */
export function gridSub(x: Grid, y: Grid, out: Grid): Grid {
  for (let k = 0; k < out.re.length; k++) {
    out.re[k] = x.re[k]! - y.re[k]!;
    out.im[k] = x.im[k]! - y.im[k]!;
  }
  return out;
}

/** out = x·y */
export function gridMul(x: Grid, y: Grid, out: Grid): Grid {
  for (let k = 0; k < out.re.length; k++) {
    const a = x.re[k]!;
    const b = x.im[k]!;
    const c = y.re[k]!;
    const d = y.im[k]!;
    out.re[k] = a * c - b * d;
    out.im[k] = a * d + b * c;
  }
  return out;
}

/** out = x·(a + bi) + (c + di) for constants: the step of Horner's rule with `scale` and `offset` as pairs. */
export function gridAffine(
  x: Grid,
  scale: readonly [number, number],
  offset: readonly [number, number],
  out: Grid,
): Grid {
  const [a, b] = scale;
  const [c, d] = offset;
  for (let k = 0; k < out.re.length; k++) {
    const u = x.re[k]!;
    const v = x.im[k]!;
    out.re[k] = u * a - v * b + c;
    out.im[k] = u * b + v * a + d;
  }
  return out;
}

/** out = x/y, scaled by the larger part of y (Smith), so that no size overflows early. */
export function gridDiv(x: Grid, y: Grid, out: Grid): Grid {
  for (let k = 0; k < out.re.length; k++) {
    const a = x.re[k]!;
    const b = x.im[k]!;
    const c = y.re[k]!;
    const d = y.im[k]!;
    if (Math.abs(c) >= Math.abs(d)) {
      const r = d / c;
      const s = 1 / (c + d * r);
      out.re[k] = (a + b * r) * s;
      out.im[k] = (b - a * r) * s;
    } else {
      const r = c / d;
      const s = 1 / (c * r + d);
      out.re[k] = (a * r + b) * s;
      out.im[k] = (b * r - a) * s;
    }
  }
  return out;
}

/** out = x² */
export function gridSqr(x: Grid, out: Grid): Grid {
  for (let k = 0; k < out.re.length; k++) {
    const a = x.re[k]!;
    const b = x.im[k]!;
    out.re[k] = (a - b) * (a + b);
    out.im[k] = 2 * a * b;
  }
  return out;
}

/** out = √x, principal. */
export function gridSqrt(x: Grid, out: Grid): Grid {
  for (let k = 0; k < out.re.length; k++) {
    const a = x.re[k]!;
    const b = x.im[k]!;
    const u = Math.sqrt((Math.sqrt(a * a + b * b) + Math.abs(a)) / 2);
    const v = u === 0 ? 0 : b / (2 * u);
    out.re[k] = a >= 0 ? u : Math.abs(v);
    out.im[k] = a >= 0 ? v : b < 0 ? -u : u;
  }
  return out;
}

/** out = e^x */
export function gridExp(x: Grid, out: Grid): Grid {
  for (let k = 0; k < out.re.length; k++) {
    const size = Math.exp(x.re[k]!);
    const angle = x.im[k]!;
    out.re[k] = size * Math.cos(angle);
    out.im[k] = size * Math.sin(angle);
  }
  return out;
}

/** out = ln x, principal. */
export function gridLn(x: Grid, out: Grid): Grid {
  for (let k = 0; k < out.re.length; k++) {
    const a = x.re[k]!;
    const b = x.im[k]!;
    out.re[k] = Math.log(Math.hypot(a, b));
    out.im[k] = Math.atan2(b, a);
  }
  return out;
}

/** out = sin x */
export function gridSin(x: Grid, out: Grid): Grid {
  for (let k = 0; k < out.re.length; k++) {
    const a = x.re[k]!;
    const b = x.im[k]!;
    out.re[k] = Math.sin(a) * Math.cosh(b);
    out.im[k] = Math.cos(a) * Math.sinh(b);
  }
  return out;
}

/** out = cos x */
export function gridCos(x: Grid, out: Grid): Grid {
  for (let k = 0; k < out.re.length; k++) {
    const a = x.re[k]!;
    const b = x.im[k]!;
    out.re[k] = Math.cos(a) * Math.cosh(b);
    out.im[k] = -Math.sin(a) * Math.sinh(b);
  }
  return out;
}
