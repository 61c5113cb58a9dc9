// The double-precision lane against complex.js objects: the same 10,000 points, both relative to the same function.
//   node --single-threaded test/bench/number-grid.mjs
import { cpus } from "node:os";
import { Complex } from "complex.js";

const lane = await import("../../dist/lib/number/grid.js");
const window = { re: [-2, 2.1], im: [-1.9, 2], columns: 100, rows: 100 };
const points = lane.gridOf(window);
const objects = Array.from(points.re, (re, k) => new Complex(re, points.im[k]));
const scattered = { re: points.im, im: points.re };
const out = lane.emptyGrid(points.re.length);
const c = new Complex(0.3, -0.2);

const coefficients = (n) => Array.from({ length: n + 1 }, (_none, k) => (k === 0 ? [1, 0] : [0.3, -0.2]));
const horner = (n) => [
  () => lane.gridPolynomial(coefficients(n), points, out),
  () =>
    objects.map((z) => {
      let s = new Complex(1, 0);
      for (let k = 0; k < n; k++) s = s.mul(z).add(c);
      return s;
    }),
];

const tasks = {
  "polynomial of degree 2": horner(2),
  "polynomial of degree 6": horner(6),
  "product of two grids": [() => lane.gridMul(points, points, out), () => objects.map((z) => z.mul(z))],
  "1/z": [() => lane.gridInv(points, out), () => objects.map((z) => z.inverse())],
  "z/w": [() => lane.gridDiv(points, points, out), () => objects.map((z) => z.div(z))],
  "exp on a window": [() => lane.windowExp(window, out), () => objects.map((z) => z.exp())],
  "exp on points of a grid": [() => lane.gridExp(points, out), () => objects.map((z) => z.exp())],
  "exp at scattered points": [() => lane.gridExp(scattered, out), () => objects.map((z) => z.exp())],
  sqrt: [() => lane.gridSqrt(points, out), () => objects.map((z) => z.sqrt())],
};

/** Processor time of one call in µs a point. The clock ticks in milliseconds, so that a measurement must last for many of them. */
function measure(f, calls) {
  const start = process.cpuUsage().user;
  for (let k = 0; k < calls; k++) f();
  return (process.cpuUsage().user - start) / calls / points.re.length;
}

/** Calls that take about 80 ms. */
function callsOf(f) {
  let calls = 4;
  while (measure(f, calls) * calls * points.re.length < 40_000) calls *= 2;
  return 2 * calls;
}

console.log(`${cpus()[0].model}, Node ${process.version}\n`);
console.log("| 10,000 points | lane, ns a point | complex.js, ns a point | ratio |\n|---|---:|---:|---:|");
for (const [name, [mine, theirs]] of Object.entries(tasks)) {
  let [a, b] = [Infinity, Infinity];
  const [fast, slow] = [callsOf(mine), callsOf(theirs)];
  for (let round = 0; round < 12; round++) {
    a = Math.min(a, measure(mine, fast));
    b = Math.min(b, measure(theirs, slow));
  }
  console.log(`| ${name} | ${(a * 1000).toFixed(1)} | ${(b * 1000).toFixed(1)} | ${(b / a).toFixed(1)} |`);
}
