// How many digits are asked for. Read once at each public entry; everything below takes a precision in bits.
import { DomainError } from "../proof/errors.ts";

interface Context {
  readonly digits: number;
  /** Bits that new values are computed with. */
  readonly bits: number;
}

const MOST_DIGITS = 1_000_000;
/** Bits beyond the digits, which a few operations use up. */
const MARGIN = 32;
let settled: Context = { digits: 20, bits: 67 + MARGIN };
let passing: Context | undefined;
let fixed = false;
// The bits of the context that holds now, in a variable of its own: every operation asks for them.
let bits = settled.bits;

function settle(context: Context): void {
  settled = context;
  bits = (passing ?? settled).bits;
}

function pass(context: Context | undefined): void {
  passing = context;
  bits = (passing ?? settled).bits;
}

/** How many proved digits a display has. */
export function provedDigits(): number;
/**
 * Asks for n proved digits in every display and every new value from now on.
 * Domain   an integer from 1 to 1,000,000. Throws DomainError otherwise; the old setting then stays.
 */
export function provedDigits(n: number): number;
export function provedDigits(n?: number): number {
  if (n === undefined) return (passing ?? settled).digits;
  const digits = checkedDigits("provedDigits", n);
  if (!fixed) settle(settledTo(digits));
  return n;
}

/** Asks for n digits whatever `provedDigits` is told later: a reader's wish that goes before the author's. */
export function fixDigits(n: number): void {
  settle(settledTo(checkedDigits("fixDigits", n)));
  fixed = true;
}

function settledTo(digits: number): Context {
  return { digits, bits: bitsOf(digits) + MARGIN };
}

/** Throws DomainError unless n is a number of digits that can be asked for. */
export function checkedDigits(subject: string, n: number): number {
  if (Number.isSafeInteger(n) && n >= 1 && n <= MOST_DIGITS) return n;
  throw new DomainError({
    subject,
    given: `${n} digits`,
    expected: `an integer from 1 to ${MOST_DIGITS}`,
    hint: n > MOST_DIGITS ? "A million digits is the most that is computed here." : "",
    argument: "n",
  });
}

/** Bits that hold n decimal digits. */
export function bitsOf(digits: number): number {
  // The double above log2 10.
  return Math.ceil(digits * 3.3219280948873626);
}

/** Bits that new values are computed with: the proved digits and a margin, or what a running `atDigits` works with. */
export function workingPrecision(): number {
  return bits;
}

/** The most bits that are tried for n digits of one value. */
export function mostBits(digits: number): number {
  return 64 * digits + 4096;
}

/**
 * Runs f with another context. The context ends with the call; should the call be cut off without unwinding, it ends
 * with the current task at the latest.
 */
export function within<T>(context: { readonly digits: number; readonly bits: number }, f: () => T): T {
  const outer = passing;
  const mine: Context = context;
  pass(mine);
  queueMicrotask(() => {
    if (passing === mine) pass(undefined);
  });
  try {
    return f();
  } finally {
    pass(outer);
  }
}
