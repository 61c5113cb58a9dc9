import type { Factorisation } from "../surface/factorisation.ts";
import { texInteger } from "./digits.ts";
import type { Kind } from "./kind.ts";

/** A product of prime powers. */
export const factorisationKind: Kind<Factorisation> = {
  text: (product) => String(product),
  tex: ({ sign, factors }) => {
    const powers = factors.map(({ prime, exponent }) =>
      exponent === 1 ? texInteger(String(prime)) : `${texInteger(String(prime))}^{${exponent}}`,
    );
    return `${sign < 0 ? "-" : ""}${powers.join(" \\cdot ") || "1"}`;
  },
  data: (product) => ({ kind: "factorisation", value: String(product.value), factors: String(product) }),
};
