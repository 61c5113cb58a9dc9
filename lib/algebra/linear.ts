// Linear algebra over a field, for the small systems that maps and curves need.

import type { Field } from "./field.ts";

/** Rows of a matrix. */
export type Matrix<T> = readonly (readonly T[])[];

/** Reduced row echelon form with the columns of the pivots. */
export function rowReduce<T>(F: Field<T>, matrix: Matrix<T>): { readonly rows: T[][]; readonly pivots: number[] } {
  const rows = matrix.map((row) => [...row]);
  const pivots: number[] = [];
  const width = rows[0]?.length ?? 0;
  for (let column = 0; column < width && pivots.length < rows.length; column++) {
    const top = pivots.length;
    const found = rows.findIndex((row, k) => k >= top && !F.isZero(row[column]!));
    if (found < 0) continue;
    [rows[top], rows[found]] = [rows[found]!, rows[top]!];
    const inverse = F.inv(rows[top]![column]!);
    rows[top] = rows[top]!.map((c) => F.mul(c, inverse));
    rows.forEach((row, k) => {
      const factor = row[column]!;
      if (k === top || F.isZero(factor)) return;
      rows[k] = row.map((c, l) => F.sub(c, F.mul(factor, rows[top]![l]!)));
    });
    pivots.push(column);
  }
  return { rows, pivots };
}

/** One solution x of A x = b, or undefined if there is none; free unknowns are put to zero. */
export function solve<T>(F: Field<T>, A: Matrix<T>, b: readonly T[]): T[] | undefined {
  const width = A[0]?.length ?? 0;
  const { rows, pivots } = rowReduce(
    F,
    A.map((row, k) => [...row, b[k]!]),
  );
  if (pivots.includes(width)) return undefined;
  const x: T[] = new Array(width).fill(F.zero);
  pivots.forEach((column, k) => {
    x[column] = rows[k]![width]!;
  });
  return x;
}

export function determinant<T>(F: Field<T>, A: Matrix<T>): T {
  if (A.length === 0) return F.one;
  const [first, ...rest] = A;
  return first!.reduce((total, entry, k) => {
    if (F.isZero(entry)) return total;
    const minor = determinant(
      F,
      rest.map((row) => row.filter((_, l) => l !== k)),
    );
    const term = F.mul(entry, minor);
    return k % 2 === 0 ? F.add(total, term) : F.sub(total, term);
  }, F.zero);
}

/** The inverse of a square matrix, or undefined if it is singular. */
export function inverse<T>(F: Field<T>, A: Matrix<T>): T[][] | undefined {
  const n = A.length;
  const { rows, pivots } = rowReduce(
    F,
    A.map((row, k) => [...row, ...row.map((_, l) => (k === l ? F.one : F.zero))]),
  );
  if (pivots.length < n || pivots.at(-1)! >= n) return undefined;
  return rows.map((row) => row.slice(n));
}
