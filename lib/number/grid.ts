// The double-precision lane for pictures: complex numbers over a grid as two Float64Arrays. Nothing here is proved: no result of it may be printed as digits.
import { DomainError } from "../proof/errors.ts";
import { turned } from "./grid-exp.ts";

export { gridExp } from "./grid-exp.ts";

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

// Loops take four points at a time through a small function that the engine puts in line: what it looks up once a round is then shared.

/** out = x·y */
export function gridMul(x: Grid, y: Grid, out: Grid): Grid {
  const { re: a, im: b } = x;
  const { re: c, im: d } = y;
  const { re, im } = out;
  const n = re.length;
  let k = 0;
  for (; k + 3 < n; k += 4) {
    mulAt(a, b, c, d, re, im, k);
    mulAt(a, b, c, d, re, im, k + 1);
    mulAt(a, b, c, d, re, im, k + 2);
    mulAt(a, b, c, d, re, im, k + 3);
  }
  for (; k < n; k++) mulAt(a, b, c, d, re, im, k);
  return out;
}

type Doubles = Float64Array;

function mulAt(xr: Doubles, xi: Doubles, yr: Doubles, yi: Doubles, re: Doubles, im: Doubles, k: number): void {
  const a = xr[k]!;
  const b = xi[k]!;
  const c = yr[k]!;
  const d = yi[k]!;
  re[k] = a * c - b * d;
  im[k] = a * d + b * c;
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

/** out = p(x) for the polynomial with these coefficients as pairs, highest power first: Horner's rule with both parts in registers, two points at a time. */
export function gridPolynomial(coefficients: readonly (readonly [number, number])[], x: Grid, out: Grid): Grid {
  const length = out.re.length;
  const count = coefficients.length;
  const c = new Float64Array(2 * count);
  coefficients.forEach(([re, im], k) => {
    c[2 * k] = re;
    c[2 * k + 1] = im;
  });
  const { re, im } = x;
  let k = 0;
  for (; k + 1 < length; k += 2) {
    const a = re[k]!;
    const b = im[k]!;
    const d = re[k + 1]!;
    const e = im[k + 1]!;
    let u = c[0]!;
    let v = c[1]!;
    let s = u;
    let t = v;
    for (let j = 2; j < c.length; j += 2) {
      const p = c[j]!;
      const q = c[j + 1]!;
      const w = u * a - v * b + p;
      v = u * b + v * a + q;
      u = w;
      const r = s * d - t * e + p;
      t = s * e + t * d + q;
      s = r;
    }
    out.re[k] = u;
    out.im[k] = v;
    out.re[k + 1] = s;
    out.im[k + 1] = t;
  }
  if (k < length) gridPolynomialAt(c, x, out, k);
  return out;
}

function gridPolynomialAt(c: Float64Array, x: Grid, out: Grid, k: number): void {
  const a = x.re[k]!;
  const b = x.im[k]!;
  let u = c[0]!;
  let v = c[1]!;
  for (let j = 2; j < c.length; j += 2) {
    const w = u * a - v * b + c[j]!;
    v = u * b + v * a + c[j + 1]!;
    u = w;
  }
  out.re[k] = u;
  out.im[k] = v;
}

/** Sizes of |z|² within which a plain quotient keeps its digits. */
const SMALLEST = 1e-290;
const LARGEST = 1e290;

/** out = 1/x */
export function gridInv(x: Grid, out: Grid): Grid {
  const { re: a, im: b } = x;
  const { re, im } = out;
  const n = re.length;
  let k = 0;
  for (; k + 3 < n; k += 4) {
    invAt(a, b, re, im, k);
    invAt(a, b, re, im, k + 1);
    invAt(a, b, re, im, k + 2);
    invAt(a, b, re, im, k + 3);
  }
  for (; k < n; k++) invAt(a, b, re, im, k);
  return out;
}

function invAt(xr: Doubles, xi: Doubles, re: Doubles, im: Doubles, k: number): void {
  const a = xr[k]!;
  const b = xi[k]!;
  const norm = a * a + b * b;
  if (norm > SMALLEST && norm < LARGEST) {
    const s = 1 / norm;
    re[k] = a * s;
    im[k] = -b * s;
  } else smithAt(1, 0, a, b, re, im, k);
}

/** out = x/y; where |y|² is out of range by the larger part of y (Smith), so that no size overflows early. */
export function gridDiv(x: Grid, y: Grid, out: Grid): Grid {
  const { re: a, im: b } = x;
  const { re: c, im: d } = y;
  const { re, im } = out;
  const n = re.length;
  let k = 0;
  for (; k + 3 < n; k += 4) {
    divAt(a, b, c, d, re, im, k);
    divAt(a, b, c, d, re, im, k + 1);
    divAt(a, b, c, d, re, im, k + 2);
    divAt(a, b, c, d, re, im, k + 3);
  }
  for (; k < n; k++) divAt(a, b, c, d, re, im, k);
  return out;
}

function divAt(xr: Doubles, xi: Doubles, yr: Doubles, yi: Doubles, re: Doubles, im: Doubles, k: number): void {
  const a = xr[k]!;
  const b = xi[k]!;
  const c = yr[k]!;
  const d = yi[k]!;
  const norm = c * c + d * d;
  if (norm > SMALLEST && norm < LARGEST) {
    const s = 1 / norm;
    re[k] = (a * c + b * d) * s;
    im[k] = (b * c - a * d) * s;
  } else smithAt(a, b, c, d, re, im, k);
}

function smithAt(a: number, b: number, c: number, d: number, re: Doubles, im: Doubles, k: number): void {
  if (Math.abs(c) >= Math.abs(d)) {
    const r = d / c;
    const s = 1 / (c + d * r);
    re[k] = (a + b * r) * s;
    im[k] = (b - a * r) * s;
  } else {
    const r = c / d;
    const s = 1 / (c * r + d);
    re[k] = (a * r + b) * s;
    im[k] = (b * r - a) * s;
  }
}

/**
 * out = e^z on the points of a window: a factor for each column and a turn for each row, so that a point costs two products. `gridExp` takes any points.
 */
export function windowExp(window: Window, out: Grid): Grid {
  const { columns, rows } = window;
  const axes = axesOf(window);
  const size = axes.re.map(Math.exp);
  for (let row = 0; row < rows; row++) {
    turned(size, Math.cos(axes.im[row]!), Math.sin(axes.im[row]!), out, row * columns);
  }
  return out;
}

/** The coordinates of the columns and of the rows of a window, as `gridOf` has them. */
function axesOf({ re, im, columns, rows }: Window): Grid {
  return {
    re: Float64Array.from({ length: columns }, (_none, k) => re[0] + ((re[1] - re[0]) * k) / (columns - 1)),
    im: Float64Array.from({ length: rows }, (_none, k) => im[1] + ((im[0] - im[1]) * k) / (rows - 1)),
  };
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

/** out = √x, principal. Two roots and a quotient of the processor are what it costs. */
export function gridSqrt(x: Grid, out: Grid): Grid {
  const { re: a, im: b } = x;
  const { re, im } = out;
  const n = re.length;
  let k = 0;
  for (; k + 1 < n; k += 2) {
    sqrtAt(a, b, re, im, k);
    sqrtAt(a, b, re, im, k + 1);
  }
  if (k < n) sqrtAt(a, b, re, im, k);
  return out;
}

function sqrtAt(xr: Doubles, xi: Doubles, re: Doubles, im: Doubles, k: number): void {
  const a = xr[k]!;
  const b = xi[k]!;
  const u = Math.sqrt((Math.sqrt(a * a + b * b) + Math.abs(a)) * 0.5);
  const v = u === 0 ? 0 : (b * 0.5) / u;
  re[k] = a >= 0 ? u : Math.abs(v);
  im[k] = a >= 0 ? v : b < 0 ? -u : u;
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
