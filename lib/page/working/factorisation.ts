// A factorisation as a derivation: the product, and that each prime is one.

import { Rational } from "../../number/rational.ts";
import type { Factorisation } from "../../surface/factorisation.ts";
import { Derivation } from "../derivation.ts";
import { table } from "../table.ts";
import { exactly } from "./parts.ts";

/** Above this, trial division is no second route any more. */
const TRIAL = 1_000_000n;

export function factorisationWorking(f: Factorisation): Derivation {
  const { value, factors, sign } = f;
  const product = factors.reduce(
    (q, { prime, exponent }) => q.times(Rational.of(prime).pow(exponent)),
    Rational.of(sign),
  );
  const tried = factors.filter(({ prime }) => prime <= TRIAL * TRIAL);
  return new Derivation("Factors of a number", { name: "factors" })
    .step("the number", {
      formula: "n",
      value,
      check: exactly(value.sign() === sign, "its sign is that of the product"),
      route: "the sign alone",
      label: "number",
    })
    .step("its primes with their exponents", {
      value: table(
        factors.map(({ prime, exponent }) => [prime, exponent]),
        { columns: ["$p$", "$e$"] },
      ),
      check: exactly(
        tried.every(({ prime }) => hasNoFactor(prime)),
        tried.length === factors.length
          ? "no prime has a factor from 2 up to its root"
          : "no prime up to 10^12 has a factor from 2 up to its root; larger ones were proved prime when they were found",
      ),
      route: "by trial division",
      label: "primes",
    })
    .step("their product", {
      value: f,
      check: exactly(product.equals(value), "the prime powers multiplied give the number"),
      route: "by multiplication",
      label: "product",
    });
}

function hasNoFactor(n: bigint): boolean {
  for (let d = 2n; d * d <= n; d++) if (n % d === 0n) return false;
  return true;
}
