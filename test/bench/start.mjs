// How long until the kernel answers, how long until the first cell's value is there, how much memory it then takes:
// beside Debian's Python kernel, by the same client, in the same run. `npm run bench:start`
import { existsSync, readFileSync } from "node:fs";
import os from "node:os";
import { KernelClient } from "../../dist/kernel/notebook/client.js";
import { kernelCommand } from "../../dist/kernel/notebook/launch.js";

const ROUNDS = Number(process.argv[2] ?? 7);
const PYTHON = "/usr/bin/python3";

const KERNELS = {
  python: {
    command: [PYTHON, "-m", "ipykernel_launcher"],
    first: "1 + 1",
  },
  halfperiod: {
    command: kernelCommand(),
    first: "const two: number = 1 + 1; two", // passes the type checker
  },
};

/** Memory of a process and all below it in MB; shared pages are counted once, in parts. */
function memory(pid) {
  const file = `/proc/${pid}/smaps_rollup`;
  if (!existsSync(file)) return 0;
  const own = Number(/^Pss:\s+(\d+)/m.exec(readFileSync(file, "utf8"))[1]) / 1024;
  const children = readFileSync(`/proc/${pid}/task/${pid}/children`, "utf8").trim().split(/\s+/).filter(Boolean);
  return children.reduce((sum, child) => sum + memory(Number(child)), own);
}

async function once({ command, first }) {
  const began = performance.now();
  const client = await KernelClient.start({ cwd: os.tmpdir(), command });
  const answered = performance.now() - began;
  const { status, reply } = await client.execute(first);
  const computed = performance.now() - began;
  if (status !== "ok") throw new Error(`the first cell failed: ${reply.ename}: ${reply.evalue}`);
  const megabytes = memory(client.pid);
  await client.shutdown();
  return [answered, computed, megabytes];
}

const mean = (list) => list.reduce((sum, x) => sum + x, 0) / list.length;
const deviation = (list) => Math.sqrt(mean(list.map((x) => (x - mean(list)) ** 2)));
const show = (list) => `${mean(list).toFixed(0)} ± ${deviation(list).toFixed(0)}`;

function row(title, python, ours) {
  const ratio = mean(ours) / mean(python);
  const error = ratio * Math.hypot(deviation(ours) / mean(ours), deviation(python) / mean(python));
  return `| ${[title, show(python), show(ours), `${ratio.toFixed(2)} ± ${error.toFixed(2)}`].join(" | ")} |`;
}

const samples = { python: [], halfperiod: [] };
for (const kernel of Object.values(KERNELS)) await once(kernel); // files into the cache
for (let round = 0; round < ROUNDS; round++) {
  for (const name of Object.keys(KERNELS)) samples[name].push(await once(KERNELS[name]));
}
const column = (name, index) => samples[name].map((sample) => sample[index]);
const titles = ["process start to kernel_info reply, ms", "process start to first cell's value, ms", "memory then, MB"];
console.log(
  `${os.cpus()[0].model}, ${os.cpus().length} cores, Node ${process.version}; mean ± deviation of ${ROUNDS} starts`,
);
console.log("first cell: a type-checked sum here, a plain sum in Python\n");
console.log("| | Python kernel | halfperiod | ratio |\n| --- | --- | --- | --- |");
for (const [index, title] of titles.entries())
  console.log(row(title, column("python", index), column("halfperiod", index)));
