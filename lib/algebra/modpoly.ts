// Polynomials modulo a large prime, fast enough for Frobenius powers: products by packing all coefficients into one integer.

import { modularInverse } from "./integer.ts";

/** Coefficients in [0, p) from the constant term up, no leading zero, [] for zero. */
export type ModPolynomial = readonly bigint[];

/** Arithmetic of F_p[x] for one prime p. */
export interface ModPolynomialRing {
  readonly p: bigint;
  add(f: ModPolynomial, g: ModPolynomial): ModPolynomial;
  sub(f: ModPolynomial, g: ModPolynomial): ModPolynomial;
  scale(c: bigint, f: ModPolynomial): ModPolynomial;
  mul(f: ModPolynomial, g: ModPolynomial): ModPolynomial;
  divide(f: ModPolynomial, g: ModPolynomial): { readonly quotient: ModPolynomial; readonly remainder: ModPolynomial };
  /** The monic greatest common divisor. */
  gcd(f: ModPolynomial, g: ModPolynomial): ModPolynomial;
  monic(f: ModPolynomial): ModPolynomial;
}

/** Below this length the schoolbook product is the faster one. */
const PACKED_FROM = 6;

export function modPolynomials(p: bigint): ModPolynomialRing {
  const digits = p.toString(16).length;
  const reduce = (c: bigint) => {
    const r = c % p;
    return r < 0n ? r + p : r;
  };
  const trim = (f: bigint[]): ModPolynomial => {
    while (f.length > 0 && f.at(-1) === 0n) f.pop();
    return f;
  };
  const ring: ModPolynomialRing = {
    p,
    add: (f, g) => combine(f, g, (a, b) => a + b),
    sub: (f, g) => combine(f, g, (a, b) => a - b),
    scale: (c, f) => trim(f.map((a) => reduce(c * a))),
    mul: (f, g) => (Math.min(f.length, g.length) < PACKED_FROM ? schoolbook(f, g) : packedProduct(f, g)),
    divide,
    gcd: (f, g) => {
      let [a, b] = [f, g];
      while (b.length > 0) [a, b] = [b, divide(a, b).remainder];
      return ring.monic(a);
    },
    monic: (f) => (f.length === 0 || f.at(-1) === 1n ? f : ring.scale(modularInverse(f.at(-1)!, p)!, f)),
  };

  function combine(f: ModPolynomial, g: ModPolynomial, by: (a: bigint, b: bigint) => bigint): ModPolynomial {
    const length = Math.max(f.length, g.length);
    return trim(Array.from({ length }, (_, k) => reduce(by(f[k] ?? 0n, g[k] ?? 0n))));
  }

  function schoolbook(f: ModPolynomial, g: ModPolynomial): ModPolynomial {
    if (f.length === 0 || g.length === 0) return [];
    const product = new Array<bigint>(f.length + g.length - 1).fill(0n);
    f.forEach((a, i) => {
      g.forEach((b, j) => {
        product[i + j]! += a * b;
      });
    });
    return trim(product.map(reduce));
  }

  /** Kronecker substitution: a coefficient of the product is below min(length)·p², so it fits into the hex digits of a slot. */
  function packedProduct(f: ModPolynomial, g: ModPolynomial): ModPolynomial {
    const width = 2 * digits + Math.min(f.length, g.length).toString(16).length;
    const product = (packed(f, width) * packed(g, width)).toString(16);
    const length = f.length + g.length - 1;
    const result = new Array<bigint>(length);
    for (let k = 0; k < length; k++) {
      const end = product.length - k * width;
      const text = end > 0 ? product.slice(Math.max(0, end - width), end) : "";
      result[k] = text === "" ? 0n : BigInt(`0x${text}`) % p;
    }
    return trim(result);
  }

  function packed(f: ModPolynomial, width: number): bigint {
    const parts = f.map((c) => c.toString(16).padStart(width, "0"));
    return BigInt(`0x${parts.reverse().join("")}`);
  }

  function divide(f: ModPolynomial, g: ModPolynomial) {
    const n = g.length - 1;
    if (f.length <= n) return { quotient: [], remainder: f };
    const inverse = g[n] === 1n ? 1n : modularInverse(g[n]!, p)!;
    const rest = [...f];
    const quotient = new Array<bigint>(f.length - n).fill(0n);
    for (let k = f.length - 1 - n; k >= 0; k--) {
      const c = reduce(rest[k + n]! * inverse);
      quotient[k] = c;
      if (c === 0n) continue;
      for (let l = 0; l < n; l++) rest[k + l] = rest[k + l]! - c * g[l]!;
    }
    return { quotient: trim(quotient), remainder: trim(rest.slice(0, n).map(reduce)) };
  }
  return ring;
}

/** F_p[x]/(h) for a monic h; h may be replaced by a factor of it when an element turns out to have no inverse. */
export interface QuotientRing {
  readonly ring: ModPolynomialRing;
  readonly modulus: ModPolynomial;
  reduce(f: ModPolynomial): ModPolynomial;
  mul(f: ModPolynomial, g: ModPolynomial): ModPolynomial;
  power(f: ModPolynomial, n: bigint): ModPolynomial;
  /** The inverse of f, or the common factor of f and the modulus. */
  inverse(f: ModPolynomial): { readonly inverse: ModPolynomial } | { readonly factor: ModPolynomial };
}

/** From this degree on a remainder is found by two products with the reversed inverse of the modulus. */
const NEWTON_FROM = 24;

export function quotientRing(ring: ModPolynomialRing, modulus: ModPolynomial): QuotientRing {
  const n = modulus.length - 1;
  const inverted = n >= NEWTON_FROM ? inverseSeries(ring, modulus.toReversed(), n) : undefined;
  const reduce = (f: ModPolynomial): ModPolynomial => {
    if (f.length <= n) return f;
    if (!inverted || f.length > 2 * n) return ring.divide(f, modulus).remainder;
    // Quotient of degree deg f − n from the reversed polynomials.
    const length = f.length - n;
    const top = f.toReversed().slice(0, length);
    const reversed = [...ring.mul(top, inverted.slice(0, length))].slice(0, length);
    while (reversed.length < length) reversed.push(0n);
    return ring.sub(f, ring.mul(trimmed(reversed.reverse()), modulus)).slice(0, n);
  };
  const mul = (f: ModPolynomial, g: ModPolynomial) => trimmed(reduce(ring.mul(f, g)));
  return {
    ring,
    modulus,
    reduce: (f) => trimmed(reduce(f)),
    mul,
    power: (f, e) => {
      let result: ModPolynomial = [1n];
      for (const digit of e.toString(2)) {
        result = mul(result, result);
        if (digit === "1") result = mul(result, f);
      }
      return trimmed(reduce(result));
    },
    inverse: (f) => inverseModulo(ring, f, modulus),
  };
}

function trimmed(f: ModPolynomial): ModPolynomial {
  let n = f.length;
  while (n > 0 && f[n - 1] === 0n) n--;
  return n === f.length ? f : f.slice(0, n);
}

/** 1/f modulo x^n for f with constant term 1, by doubling Newton. */
function inverseSeries(ring: ModPolynomialRing, f: ModPolynomial, n: number): ModPolynomial {
  let g: ModPolynomial = [1n];
  for (let length = 1; length < n; ) {
    length = Math.min(2 * length, n);
    const error = ring.sub([2n], ring.mul(f.slice(0, length), g).slice(0, length));
    g = ring.mul(g, error).slice(0, length);
  }
  return [...g, ...new Array<bigint>(n - g.length).fill(0n)];
}

function inverseModulo(ring: ModPolynomialRing, f: ModPolynomial, modulus: ModPolynomial) {
  let [r0, r1] = [modulus, f];
  let [s0, s1]: [ModPolynomial, ModPolynomial] = [[], [1n]];
  while (r1.length > 1) {
    const { quotient, remainder } = ring.divide(r0, r1);
    [r0, r1] = [r1, remainder];
    [s0, s1] = [s1, ring.sub(s0, ring.mul(quotient, s1))];
  }
  if (r1.length === 0) return { factor: ring.monic(r0) };
  return { inverse: ring.scale(modularInverse(r1[0]!, ring.p)!, s1) };
}
