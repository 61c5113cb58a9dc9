// What a cell costs: loops over notebook variables against a plain function, the price of operators on plain numbers,
// the check of late cells, and the round trip of a trivial cell beside Debian's Python kernel. `node test/bench/cells.mjs`
import { readFileSync } from "node:fs";
import os from "node:os";
import { createCellSession } from "../../dist/kernel/cell/session.js";
import { KernelClient } from "../../dist/kernel/notebook/client.js";
import { kernelCommand } from "../../dist/kernel/notebook/launch.js";

const ROUNDS = Number(process.argv[2] ?? 7);
const PYTHON = ["/usr/bin/python3", "-m", "ipykernel_launcher"];

const median = (list) => [...list].sort((a, b) => a - b)[list.length >> 1];
/** Median distance from the median: a few stalls of the machine do not move it. */
const deviation = (list) => median(list.map((x) => Math.abs(x - median(list))));
const show = (list) => `${median(list).toFixed(1)} ± ${deviation(list).toFixed(1)}`;

function row(title, reference, ours) {
  const ratio = median(ours) / median(reference);
  const error = ratio * Math.hypot(deviation(ours) / median(ours), deviation(reference) / median(reference));
  console.log(`| ${title} | ${show(reference)} | ${show(ours)} | ${ratio.toFixed(2)} ± ${error.toFixed(2)} |`);
}

let cell = 0;
let begun = () => {};
const session = createCellSession({ cwd: os.tmpdir(), onEvent: () => begun() });

async function value(code) {
  cell += 1;
  const request = { cell, executionCount: cell, silent: false, allowStdin: false, userExpressions: {} };
  const outcome = await session.execute({ ...request, code });
  if (outcome.status === "error") throw new Error(outcome.traceback.join("\n"));
  return outcome.result?.data["text/plain"];
}

/** Processor time of two cells in ms, in turns; the first runs warm up. A busy machine stretches the clock, not this. */
async function compare(title, reference, ours) {
  const samples = [[], []];
  for (let round = -2; round < ROUNDS; round++) {
    for (const [index, code] of [reference, ours].entries()) {
      const spent = await value(`const began = process.cpuUsage(); ${code}; String(process.cpuUsage(began).user)`);
      if (round >= 0) samples[index].push(Number(JSON.parse(spent)) / 1000);
    }
  }
  row(title, ...samples);
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

console.log(
  `${os.cpus()[0].model}, ${os.cpus().length} cores, Node ${process.version}; ms, median ± median deviation\n`,
);
console.log("| | reference | cell | ratio |\n| --- | --- | --- | --- |");

await value(
  "const points = Array.from({ length: 1000 }, (_, n) => ({ x: n, y: 0 })); let total = 0; const half = real('0.5')",
);
await compare(
  "1e7 steps over objects: in a function, at the top of a cell",
  "(() => { for (let k = 0; k < 10000; k++) for (const p of points) p.y += p.x })()",
  "for (let k = 0; k < 10000; k++) for (const p of points) p.y += p.x",
);
await compare(
  "1e7 steps with a number: local, accumulated in a notebook variable",
  "{ let sum = 0; for (let k = 0; k < 1e7; k++) sum += k * 0.5; total = sum }",
  "for (let k = 0; k < 1e7; k++) total += k * 0.5",
);
await compare(
  "1e7 plain steps: without the library in sight, in a cell that uses it",
  "{ let sum = 0; for (let k = 0; k < 1e7; k++) sum = sum * 0.5 + k - 1 }",
  "void (half + 1); { let sum = 0; for (let k = 0; k < 1e7; k++) sum = sum * 0.5 + k - 1 }",
);

/** Processor time that the type checker has taken, in ms: the checks of a busy machine are compared by that. */
function checkerTime() {
  const children = readFileSync(`/proc/${process.pid}/task/${process.pid}/children`, "utf8").trim().split(" ");
  const checker = children.find((pid) => /snapshot-blob|types/.test(readFileSync(`/proc/${pid}/cmdline`, "utf8")));
  return Number(readFileSync(`/proc/${checker}/schedstat`, "utf8").split(" ")[0]) / 1e6;
}

const early = [];
for (let n = 0; n < 200; n++) {
  const began = checkerTime();
  await value(`const v${n} = ${n === 0 ? "half" : `v${n - 1}`} + ${n}`);
  early.push(checkerTime() - began);
}
row(
  "check of a cell with an operator on the cell before: cells 10-40, cells 170-200",
  early.slice(10, 40),
  early.slice(170),
);

// How long after the request a long evaluation of the library has stopped.
const stops = [];
for (let n = 0; n < ROUNDS; n++) {
  const runs = new Promise((resolve) => {
    begun = resolve;
  });
  const running = value(`process.stdout.write("begun"); lattice({ tau: ${n + 2}*i }).wp(1/3).digits(10000)`).then(
    () => "ended by itself",
    () => "stopped",
  );
  await runs;
  await new Promise((resolve) => setTimeout(resolve, 100));
  const asked = performance.now();
  session.interrupt();
  if ((await running) === "stopped") stops.push(performance.now() - asked);
}
console.log(
  `| an interrupt in a 10,000-digit ℘: allowed, until stopped | 300 | ${show(stops)} | ${(median(stops) / 300).toFixed(2)} |`,
);
await session.shutdown();

row(
  "round trip of a trivial cell: Python kernel, this kernel",
  await roundTrips(PYTHON),
  await roundTrips(kernelCommand()),
);
