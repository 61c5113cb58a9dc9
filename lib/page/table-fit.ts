// How a table is made to fit a page: parts of complex numbers under each other first, then digits in several lines.

import type { Cell } from "./kind.ts";
import type { Column, NumberWidths } from "./table-column.ts";

/** Width of a page in digits. */
const PAGE = 78;
/** Space between columns, and what a group of five digits takes with its gap. */
const GAP = 2.4;
const GROUP = 5.36;

/** Words up to this length stay on one line, if the row fits the page. */
export const SHORT_WORDS = 32;

/** The columns with the mildest measures under which a row fits the page, and whether one does. */
export function fitted(
  columns: readonly Column[],
  rows: readonly (readonly Cell[])[],
): { readonly columns: readonly Column[]; readonly fits: boolean } {
  const measures = [
    { stacked: false, groups: Number.POSITIVE_INFINITY },
    { stacked: true, groups: Number.POSITIVE_INFINITY },
    ...[12, 11, 10, 9, 8, 7, 6, 5, 4, 3].map((groups) => ({ stacked: true, groups })),
  ];
  const candidates = measures.map((measure) => columns.map((column) => ({ ...column, ...measure })));
  const fits = (candidate: readonly Column[]): boolean =>
    candidate.reduce(
      (sum, column, k) =>
        sum +
        GAP +
        width(
          column,
          rows.map((row) => row[k]),
          k === 0,
        ),
      0,
    ) <= PAGE;
  const found = candidates.find(fits);
  return { columns: found ?? candidates.at(-1) ?? columns, fits: found !== undefined };
}

function width(column: Column, cells: readonly (Cell | undefined)[], first: boolean): number {
  const others = cells.map((cell) => {
    if (!cell || cell.kind === "number") return 0;
    // Words wrap where they are many, but not in the first column, where they head their row.
    if (cell.kind === "words") return 0.85 * (first ? cell.text.length : Math.min(SHORT_WORDS, cell.text.length));
    // Fractions are set over each other.
    return 0.8 * Math.max(...cell.text.split("/").map((part) => part.length));
  });
  return Math.max(0.85 * Math.min(24, column.head.length), numberWidth(column), ...others);
}

function numberWidth({ re, im, stacked, groups }: Column): number {
  const [a, b] = [partWidth(re, groups), partWidth(im, groups)];
  if (b === 0) return a;
  return stacked ? Math.max(a, b) + 3 : a + b + 5;
}

function partWidth(widths: NumberWidths | undefined, groups: number): number {
  if (!widths) return 0;
  const { integer, fraction, tail } = widths;
  return integer + 1 + Math.min(Math.ceil(fraction / 5), groups) * GROUP + tail;
}
