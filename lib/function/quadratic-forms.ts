// Reduced positive definite binary quadratic forms.
import { gcd } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";

/** a X² + b XY + c Y². */
export interface Form {
  readonly a: bigint;
  readonly b: bigint;
  readonly c: bigint;
}

/** Beyond this the forms alone take more than half a minute. */
const LARGEST = 100_000_000n;

/**
 * The primitive reduced forms of a negative discriminant, −a < b <= a < c or 0 <= b <= a = c, by rising a and then |b|, b > 0 first.
 *
 * Domain   D < 0, D ≡ 0 or 1 mod 4.
 * Cost     about |D| / 6 steps.
 * Throws   DomainError for another D, and for |D| over 10^8.
 * Source   H. Cohen, A Course in Computational Algebraic Number Theory, 5.3.1 and algorithm 5.3.5.
 */
export function reducedForms(discriminant: bigint): Form[] {
  refuseDiscriminant(discriminant);
  const size = -discriminant;
  const forms: Form[] = [];
  // a <= √(|D|/3)
  for (let a = 1n; 3n * a * a <= size; a += 1n) {
    for (let b = discriminant & 1n; b <= a; b += 2n) {
      const product = b * b + size;
      if (product % (4n * a) !== 0n) continue;
      const c = product / (4n * a);
      if (c < a || gcd(gcd(a, b), c) !== 1n) continue;
      forms.push({ a, b, c });
      if (b > 0n && b < a && a < c) forms.push({ a, b: -b, c });
    }
  }
  return forms;
}

function refuseDiscriminant(discriminant: bigint): void {
  const rest = ((discriminant % 4n) + 4n) % 4n;
  if (discriminant < 0n && rest <= 1n) {
    if (-discriminant <= LARGEST) return;
    throw new DomainError({
      subject: "class polynomial",
      given: `the discriminant ${discriminant}`,
      expected: `|D| up to ${LARGEST}`,
      hint: "The forms are found in |D|/6 steps, and coefficients grow like exp(π√|D|).",
      argument: "discriminant",
    });
  }
  throw new DomainError({
    subject: "class polynomial",
    given: `the discriminant ${discriminant}`,
    expected: "a negative integer that is 0 or 1 modulo 4",
    hint: discriminant < 0n ? `4·(${discriminant}) = ${4n * discriminant} is one.` : "",
    argument: "discriminant",
  });
}
