// The double-precision lane against complex.js objects: the same 10,000 points, both relative to the same function.
//   node test/bench/number-grid.mjs
import { cpus } from "node:os";
import { Complex } from "complex.js";

const lane = await import("../../dist/lib/number/grid.js");
const points = lane.gridOf({ re: [-2, 2.1], im: [-1.9, 2], columns: 100, rows: 100 });
const objects = Array.from(points.re, (re, k) => new Complex(re, points.im[k]));
const out = lane.emptyGrid(points.re.length);
const copy = lane.emptyGrid(points.re.length);
const c = new Complex(0.3, -0.2);

const tasks = {
  "z² + c": [
    () => lane.gridAffine(lane.gridSqr(points, copy), [1, 0], [0.3, -0.2], out),
    () => objects.map((z) => z.mul(z).add(c)),
  ],
  "polynomial of degree 6": [
    () => {
      copy.re.fill(1);
      copy.im.fill(0);
      for (let k = 0; k < 6; k++) lane.gridAffine(lane.gridMul(copy, points, copy), [1, 0], [0.3, -0.2], copy);
    },
    () =>
      objects.map((z) => {
        let s = new Complex(1, 0);
        for (let k = 0; k < 6; k++) s = s.mul(z).add(c);
        return s;
      }),
  ],
  "1/z": [() => lane.gridDiv(points, points, out), () => objects.map((z) => z.div(z))],
  exp: [() => lane.gridExp(points, out), () => objects.map((z) => z.exp())],
  sqrt: [() => lane.gridSqrt(points, out), () => objects.map((z) => z.sqrt())],
};

function measure(f) {
  const start = process.cpuUsage().user;
  for (let k = 0; k < 20; k++) f();
  return (process.cpuUsage().user - start) / 20 / points.re.length;
}

console.log(`${cpus()[0].model}, Node ${process.version}\n`);
console.log("| 10,000 points | lane, ns a point | complex.js, ns a point | ratio |\n|---|---:|---:|---:|");
for (const [name, [mine, theirs]] of Object.entries(tasks)) {
  let [a, b] = [Infinity, Infinity];
  for (let round = 0; round < 30; round++) {
    a = Math.min(a, measure(mine) || Infinity);
    b = Math.min(b, measure(theirs));
  }
  console.log(`| ${name} | ${(a * 1000).toFixed(1)} | ${(b * 1000).toFixed(1)} | ${(b / a).toFixed(1)} |`);
}
