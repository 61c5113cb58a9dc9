// Runs the tests of the cells on other versions of Node: `node test/kernel/cell/node-versions.mjs 22 24 26 [--slow]`.
// The npm package `node` brings the binaries; they are put into a folder of their own.
import { spawnSync } from "node:child_process";
import { existsSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), "../../..");
const slow = process.argv.includes("--slow");
const asked = process.argv.slice(2).filter((argument) => /^\d+$/.test(argument));
const versions = asked.length > 0 ? asked : ["20", "22", "24", "26"];
const folder = path.join(os.tmpdir(), "halfperiod-node");

function run(command, args) {
  return spawnSync(command, args, { cwd: root, stdio: "inherit" }).status === 0;
}

/** The binary of a major version, fetched once. */
function binary(version) {
  const place = path.join(folder, version);
  const node = path.join(place, "node_modules", "node", "bin", "node");
  if (!existsSync(node)) run("npm", ["install", "--silent", "--prefix", place, `node@${version}`]);
  return node;
}

const failed = versions.filter((version) => {
  const node = binary(version);
  console.log(`\nNode ${version}`);
  run(node, ["kernel/bin/setup.mjs"]);
  const project = slow ? "slow" : "common";
  return !run(node, ["node_modules/vitest/vitest.mjs", "run", "--project", project, "test/kernel/cell"]);
});
console.log(failed.length > 0 ? `\nfailed on Node ${failed.join(", ")}` : "\nall versions pass");
process.exitCode = failed.length > 0 ? 1 : 0;
