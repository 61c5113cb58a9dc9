// Real polynomials in double precision, for drawing only: nothing that is shown as a number comes from here.

/** Coefficients from the constant term up. */
export type Coefficients = readonly number[];

export function evaluate(p: Coefficients, x: number): number {
  let sum = 0;
  for (let k = p.length - 1; k >= 0; k--) sum = sum * x + (p[k] ?? 0);
  return sum;
}

export function derivative(p: Coefficients): number[] {
  return p.slice(1).map((c, k) => c * (k + 1));
}

export function add(p: Coefficients, q: Coefficients): number[] {
  return Array.from({ length: Math.max(p.length, q.length) }, (_, k) => (p[k] ?? 0) + (q[k] ?? 0));
}

export function scale(p: Coefficients, factor: number): number[] {
  return p.map((c) => c * factor);
}

export function multiply(...factors: readonly Coefficients[]): number[] {
  return factors.reduce<number[]>(
    (product, q) => {
      const out = new Array<number>(Math.max(0, product.length + q.length - 1)).fill(0);
      product.forEach((a, i) => {
        q.forEach((b, k) => {
          out[i + k] = (out[i + k] ?? 0) + a * b;
        });
      });
      return out;
    },
    [1],
  );
}

/** Without leading coefficients that are only rounding noise beside the largest. */
export function trim(p: Coefficients): number[] {
  const largest = Math.max(0, ...p.map(Math.abs));
  let length = p.length;
  while (length > 0 && Math.abs(p[length - 1] ?? 0) <= largest * 1e-13) length--;
  return p.slice(0, length);
}

/**
 * Real roots in [low, high], rising, each multiple root once. Between two neighbouring roots of the derivative p is
 * monotone, so a change of sign is bisected; where p touches zero at a root of the derivative that counts as a root.
 */
export function realRoots(polynomial: Coefficients, low: number, high: number): number[] {
  const p = trim(polynomial);
  if (p.length <= 1 || !(low <= high)) return [];
  const bends = realRoots(derivative(p), low, high);
  const marks = [low, ...bends, high];
  // Two roots closer than this are one for a drawing.
  const close = (high - low) * 1e-9;
  const isRoot = (x: number, k: number): boolean =>
    isNoise(p, x) || (k > 0 && k < marks.length - 1 && touches(p, x, close));
  const roots: number[] = marks.filter(isRoot);
  for (let k = 0; k + 1 < marks.length; k++) {
    const [a, b] = [marks[k]!, marks[k + 1]!];
    if (isRoot(a, k) || isRoot(b, k + 1)) continue;
    if (Math.sign(evaluate(p, a)) !== Math.sign(evaluate(p, b))) roots.push(bisect(p, a, b));
  }
  return distinct(roots, (high - low) * 1e-10);
}

/** |p(x)| is no larger than the rounding of its own terms. */
function isNoise(p: Coefficients, x: number): boolean {
  const size = p.reduce((sum, c, k) => sum + Math.abs(c) * Math.abs(x) ** k, 0);
  return Math.abs(evaluate(p, x)) <= size * 4e-15;
}

/** At a root x of the derivative: whether p comes so near to zero that its two roots would be `close` to x. */
function touches(p: Coefficients, x: number, close: number): boolean {
  return Math.abs(evaluate(p, x)) <= (Math.abs(evaluate(derivative(derivative(p)), x)) * close * close) / 2;
}

function bisect(p: Coefficients, from: number, to: number): number {
  let [a, b] = [from, to];
  const sign = Math.sign(evaluate(p, a));
  for (let step = 0; step < 200; step++) {
    const middle = (a + b) / 2;
    if (middle === a || middle === b) return middle;
    if (Math.sign(evaluate(p, middle)) === sign) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}

function distinct(roots: readonly number[], gap: number): number[] {
  const sorted = [...roots].sort((a, b) => a - b);
  return sorted.filter((x, k) => k === 0 || x - sorted[k - 1]! > gap);
}
