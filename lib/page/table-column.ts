// What is known of a column of a table before it is set.

/** Widths in digits of the parts of the numbers in a column. */
export interface NumberWidths {
  /** Digits before the point, with a place for a sign where one number has it. */
  readonly integer: number;
  readonly signed: boolean;
  readonly fraction: number;
  /** Room for dots, a power of ten and a radius. */
  readonly tail: number;
}

export interface Column {
  readonly head: string;
  /** Real and imaginary part under each other. */
  readonly stacked: boolean;
  /** Groups of digits that a line of the cell holds. */
  readonly groups: number;
  /** Absent: the column holds no numbers. */
  readonly re?: NumberWidths;
  readonly im?: NumberWidths;
}

/** The widths that hold both parts of a complex number under each other. */
export function bothParts({ re, im }: Column): NumberWidths | undefined {
  if (!re || !im) return im && { ...im, signed: true };
  return {
    integer: Math.max(re.integer, im.integer),
    signed: true,
    fraction: Math.max(re.fraction, im.fraction),
    tail: Math.max(re.tail, im.tail),
  };
}
