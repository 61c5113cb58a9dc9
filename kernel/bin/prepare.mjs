// For the Node that runs this: the start-up snapshot of the types process, and the code caches of the bundles. For the
// latter a kernel runs a few cells, then keeps the code that V8 has compiled for them.
import os from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { buildSnapshot } from "../../dist/kernel/cell/snapshot/build.js";
import { KernelClient } from "../../dist/kernel/notebook/client.js";

const kernel = path.join(path.dirname(fileURLToPath(import.meta.url)), "kernel.cjs");
const CELLS = [
  "const half = real('0.5'); half + 1/3",
  "const E = curve`y^2 + y = x^3 - x`; E",
  "E.lattice()",
  "console.log(half); (globalThis as Record<symbol, any>)[Symbol.for('halfperiod.keepCode')]?.()",
];

const failed = buildSnapshot();
// No reason to fail a set-up: the checker starts without it too.
if (failed !== undefined) process.stderr.write(`halfperiod: no start-up snapshot (${failed.trim().split("\n")[0]})\n`);

const env = { HALFPERIOD_KEEP_CODE: "1", HALFPERIOD_HISTORY: "off" };
const client = await KernelClient.start({ cwd: os.tmpdir(), command: [process.execPath, kernel], env });
try {
  for (const code of CELLS) {
    const { status, reply } = await client.execute(code, { limit: 60_000 });
    if (status !== "ok") throw new Error(`${reply.ename}: ${reply.evalue}`);
  }
} finally {
  await client.shutdown();
}
