// What curves cost: invariants, minimal model, torsion and 50-digit periods of many curves; multiples nP by whole numbers against
// repeated chords and tangents; the order of E(F_p). `node test/bench/curves.mjs [rounds]` after a build.
import { readFileSync } from "node:fs";
import os from "node:os";
import { rationals } from "../../dist/lib/algebra/rationals.js";
import { countPoints } from "../../dist/lib/arithmetic/order-fp.js";
import { multiplyPoint } from "../../dist/lib/curve/group.js";
import { provedDigits } from "../../dist/lib/number/context.js";
import { curve } from "../../dist/lib/surface/make-curve.js";

const ROUNDS = Number(process.argv[2] ?? 5);
const mean = (list) => list.reduce((sum, x) => sum + x, 0) / list.length;
const deviation = (list) => Math.sqrt(mean(list.map((x) => (x - mean(list)) ** 2)));
const show = (list) => `${mean(list).toPrecision(3)} ± ${deviation(list).toPrecision(2)}`;

/** Milliseconds of each round; the first is a warm-up. */
function times(f) {
  const samples = [];
  for (let round = -1; round < ROUNDS; round++) {
    const began = performance.now();
    f();
    if (round >= 0) samples.push(performance.now() - began);
  }
  return samples;
}

const table = JSON.parse(readFileSync(new URL("../lib/arithmetic/curves.json", import.meta.url), "utf8"));
console.log(`Node ${process.version}, ${os.cpus()[0].model}; ms, mean ± deviation of ${ROUNDS} rounds\n`);

provedDigits(50);
const parts = {
  "invariants and minimal model": (E) => E.minimal().curve.discriminant,
  torsion: (E) => E.torsion().order,
  "periods, 50 digits": (E) => E.lattice().periods.map((w) => w.digits(50)),
  "all three": (E) => [E.minimal().curve.j, E.torsion().order, E.lattice().periods.map((w) => w.digits(50))],
};
console.log(`| ${table.entries.length} curves | ms | curves a second |`);
console.log("| --- | --- | --- |");
for (const [name, part] of Object.entries(parts)) {
  const spent = times(() => {
    for (const { a } of table.entries) part(curve({ a }));
  });
  console.log(`| ${name} | ${show(spent)} | ${Math.round((1000 * table.entries.length) / mean(spent))} |`);
}

console.log("\n| n·P on y² + y = x³ − x | chords and tangents | whole numbers | ratio |");
console.log("| --- | --- | --- | --- |");
const P = curve({ a: [0, 0, 1, -1, 0] }).point(0, 0);
for (const n of [10, 100, 200, 1000]) {
  const ours = times(() => P.times(n));
  const reference = n < 300 ? times(() => multiplyPoint(rationals, P.curve.a, BigInt(n), P.coordinates)) : undefined;
  const ratio = reference ? (mean(ours) / mean(reference)).toPrecision(2) : "not run";
  console.log(`| ${n} | ${reference ? show(reference) : "not run"} | ${show(ours)} | ${ratio} |`);
}

console.log("\n| order of E(F_p) | ms |");
console.log("| --- | --- |");
for (const [bits, p] of [
  [20, 1_048_573n],
  [40, 1_099_511_627_689n],
  [60, 1_152_921_504_606_846_883n],
]) {
  console.log(`| ${bits} bits | ${show(times(() => countPoints([0n, 0n, 1n, -1n, 0n], p)))} |`);
}
