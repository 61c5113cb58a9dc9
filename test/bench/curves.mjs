// What curves cost: invariants, minimal model, torsion and 50-digit periods of a thousand curves in one cell of the kernel, and by parts as
// a library; multiples nP by whole numbers against repeated chords and tangents; the order of E(F_p). All in CPU time of the process, so
// that other load on the machine does not count. `node test/bench/curves.mjs [rounds]` after a build.
import { readFileSync } from "node:fs";
import os from "node:os";
import { createCellSession } from "../../dist/kernel/cell/session.js";
import { rationals } from "../../dist/lib/algebra/rationals.js";
import { countPoints } from "../../dist/lib/arithmetic/order-fp.js";
import { multiplyPoint } from "../../dist/lib/curve/group.js";
import { provedDigits } from "../../dist/lib/number/context.js";
import { curve } from "../../dist/lib/surface/make-curve.js";

const ROUNDS = Number(process.argv[2] ?? 5);
const mean = (list) => list.reduce((sum, x) => sum + x, 0) / list.length;
const deviation = (list) => Math.sqrt(mean(list.map((x) => (x - mean(list)) ** 2)));
const show = (list) => `${mean(list).toPrecision(3)} ± ${deviation(list).toPrecision(2)}`;

/** CPU milliseconds of each round; the first is a warm-up. */
async function times(f, rounds = ROUNDS) {
  const samples = [];
  for (let round = -1; round < rounds; round++) {
    const began = process.cpuUsage();
    await f();
    const { user, system } = process.cpuUsage(began);
    if (round >= 0) samples.push((user + system) / 1000);
  }
  return samples;
}

const table = JSON.parse(readFileSync(new URL("../lib/arithmetic/curves.json", import.meta.url), "utf8"));
// A thousand different curves: those of the table and their twists, in models that are not minimal.
const TWISTS = [1, -1, 2, -2, 3, -3];
const models = TWISTS.flatMap((d) =>
  table.entries.map(({ a }) => {
    const [a1, a2, a3, a4, a6] = a.map(BigInt);
    const [b2, b4, b6] = [a1 * a1 + 4n * a2, a1 * a3 + 2n * a4, a3 * a3 + 4n * a6];
    const D = BigInt(d);
    return d === 1 ? a.map(BigInt) : [0n, D * b2, 0n, 8n * D * D * b4, 16n * D ** 3n * b6];
  }),
).slice(0, 1000);

console.log(`Node ${process.version}, ${os.cpus()[0].model}; CPU ms, mean ± deviation of ${ROUNDS} rounds\n`);

let cell = 0;
const session = createCellSession({ cwd: os.tmpdir(), onEvent: () => {} });
async function run(code) {
  cell += 1;
  const outcome = await session.execute({
    cell,
    executionCount: cell,
    silent: false,
    allowStdin: false,
    userExpressions: {},
    code,
  });
  if (outcome.status === "error") throw new Error(outcome.traceback.join("\n"));
  return outcome.result?.data["text/plain"];
}
await run(`provedDigits(50); const models = [${models.map((a) => `[${a.map((c) => `${c}n`)}]`)}]; models.length`);
// Cells run in a thread or process of their own, so the cell reads its CPU time itself.
const CELL = `const began = process.cpuUsage();
let orders = 0;
for (const a of models) {
  const E = curve({ a });
  const { curve: M } = E.minimal();
  const [w1, w2] = M.lattice().periods;
  orders += E.torsion().order + M.j.num.toString().length + String(w1).length + String(w2).length;
}
const spent = process.cpuUsage(began);
String(spent.user + spent.system)`;
const inCell = [];
for (let round = 0; round <= ROUNDS; round++) inCell.push(Number(JSON.parse(await run(CELL))) / 1000);
const [cold, ...warm] = inCell;
console.log(
  "| 1,000 curves: invariants, minimal model, torsion, 50-digit periods printed | CPU ms | curves a CPU second |",
);
console.log("| --- | --- | --- |");
console.log(`| in one cell of the kernel, its first run | ${cold.toPrecision(3)} | ${Math.round(1e6 / cold)} |`);
console.log(`| the same cell again | ${show(warm)} | ${Math.round(1e6 / mean(warm))} |`);

provedDigits(50);
const parts = {
  "library: invariants and minimal model": (E) => E.minimal().curve.discriminant,
  "library: torsion": (E) => E.torsion().order,
  "library: periods, 50 digits": (E) => E.lattice().periods.map((w) => w.digits(50)),
};
for (const [name, part] of Object.entries(parts)) {
  const spent = await times(() => {
    for (const a of models) part(curve({ a }));
  });
  console.log(`| ${name} | ${show(spent)} | ${Math.round(1e6 / mean(spent))} |`);
}

console.log("\n| n·P on y² + y = x³ − x, rank 1 | chords and tangents | whole numbers | ratio |");
console.log("| --- | --- | --- | --- |");
const P = curve({ a: [0, 0, 1, -1, 0] }).point(0, 0);
for (const n of [10, 100, 200, 1000]) {
  const repeat = n === 1000 ? 5 : 50;
  const each = (list) => list.map((ms) => ms / repeat);
  const many = (f) => () => {
    for (let k = 0; k < repeat; k++) f();
  };
  const ours = each(await times(many(() => P.times(n))));
  const plain = many(() => multiplyPoint(rationals, P.curve.a, BigInt(n), P.coordinates));
  const reference = n < 300 ? each(await times(plain)) : undefined;
  const ratio = reference ? (mean(ours) / mean(reference)).toPrecision(2) : "not run";
  console.log(`| ${n} | ${reference ? show(reference) : "not run"} | ${show(ours)} | ${ratio} |`);
}

console.log("\n| order of E(F_p), y² + y = x³ − x | method | CPU ms |");
console.log("| --- | --- | --- |");
for (const [bits, p, method, rounds] of [
  [20, 1_048_573n, "steps", ROUNDS],
  [40, 1_099_511_627_689n, "steps", ROUNDS],
  [60, 1_152_921_504_606_846_883n, "steps", ROUNDS],
  [80, 1_208_925_819_614_629_174_706_111n, "traces and steps", 2],
  [100, 1_267_650_600_228_229_401_496_703_205_361n, "traces and steps", 2],
  [128, 340_282_366_920_938_463_463_374_607_431_768_211_297n, "traces and steps", 1],
]) {
  const spent = await times(() => countPoints([0n, 0n, 1n, -1n, 0n], p), rounds);
  console.log(`| ${bits} bits | ${method} | ${show(spent)} |`);
}
process.exit(0);
