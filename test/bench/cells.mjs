// What a cell costs: loops over notebook variables against a plain function, the price of operators on plain numbers,
// the check of late cells, and the round trip of a trivial cell beside Debian's Python kernel. `node test/bench/cells.mjs`
import os from "node:os";
import { createCellSession } from "../../dist/kernel/cell/session.js";
import { KernelClient } from "../../dist/kernel/notebook/client.js";
import { kernelCommand } from "../../dist/kernel/notebook/launch.js";

const ROUNDS = Number(process.argv[2] ?? 7);
const PYTHON = ["/usr/bin/python3", "-m", "ipykernel_launcher"];

const mean = (list) => list.reduce((sum, x) => sum + x, 0) / list.length;
const deviation = (list) => Math.sqrt(mean(list.map((x) => (x - mean(list)) ** 2)));
const show = (list) => `${mean(list).toFixed(1)} ± ${deviation(list).toFixed(1)}`;

function row(title, reference, ours) {
  const ratio = mean(ours) / mean(reference);
  const error = ratio * Math.hypot(deviation(ours) / mean(ours), deviation(reference) / mean(reference));
  console.log(`| ${title} | ${show(reference)} | ${show(ours)} | ${ratio.toFixed(2)} ± ${error.toFixed(2)} |`);
}

let cell = 0;
const session = createCellSession({ cwd: os.tmpdir(), onEvent: () => {} });

async function value(code) {
  cell += 1;
  const request = { cell, executionCount: cell, silent: false, allowStdin: false, userExpressions: {} };
  const outcome = await session.execute({ ...request, code });
  if (outcome.status === "error") throw new Error(outcome.traceback.join("\n"));
  return outcome.result?.data["text/plain"];
}

/** Milliseconds of a cell that ends with its own time; the first runs warm up. */
async function times(code) {
  const samples = [];
  for (let round = -2; round < ROUNDS; round++) {
    const spent = Number(
      await value(`const began = performance.now(); ${code}; String(performance.now() - began)`).then(JSON.parse),
    );
    if (round >= 0) samples.push(spent);
  }
  return samples;
}

async function roundTrips(command) {
  const client = await KernelClient.start({ cwd: os.tmpdir(), command });
  const samples = [];
  for (let round = -10; round < 30; round++) {
    const began = performance.now();
    await client.execute(`${round} + 1`);
    if (round >= 0) samples.push(performance.now() - began);
  }
  await client.shutdown();
  return samples;
}

console.log(`${os.cpus()[0].model}, ${os.cpus().length} cores, Node ${process.version}; ms, mean ± deviation\n`);
console.log("| | reference | cell | ratio |\n| --- | --- | --- | --- |");

await value(
  "const points = Array.from({ length: 1000 }, (_, n) => ({ x: n, y: 0 })); let total = 0; const half = real('0.5')",
);
row(
  "1e6 steps over objects: in a function, at the top of a cell",
  await times("(() => { for (let k = 0; k < 1000; k++) for (const p of points) p.y += p.x })()"),
  await times("for (let k = 0; k < 1000; k++) for (const p of points) p.y += p.x"),
);
row(
  "1e7 steps with a number: local, accumulated in a notebook variable",
  await times("{ let sum = 0; for (let k = 0; k < 1e7; k++) sum += k * 0.5; total = sum }"),
  await times("for (let k = 0; k < 1e7; k++) total += k * 0.5"),
);
row(
  "1e7 plain steps: without the library in sight, in a cell that uses it",
  await times("{ let sum = 0; for (let k = 0; k < 1e7; k++) sum = sum * 0.5 + k - 1 }"),
  await times("void (half + 1); { let sum = 0; for (let k = 0; k < 1e7; k++) sum = sum * 0.5 + k - 1 }"),
);

const early = [];
for (let n = 0; n < 200; n++) {
  const began = performance.now();
  await value(`const v${n} = ${n === 0 ? "half" : `v${n - 1}`} + ${n}`);
  early.push(performance.now() - began);
}
row("a cell with an operator on the cell before: cells 10-40, cells 170-200", early.slice(10, 40), early.slice(170));
await session.shutdown();

row(
  "round trip of a trivial cell: Python kernel, this kernel",
  await roundTrips(PYTHON),
  await roundTrips(kernelCommand()),
);
