// How the two processes of a session are started.
import { type ChildProcess, spawn } from "node:child_process";
import { fileURLToPath } from "node:url";

/** Flags of the cells' process: what interrupts need (see child/stop.ts), and two warnings less. */
const CELL_FLAGS = [
  "--no-force-async-hooks-checks",
  "--expose-internals",
  "--disable-warning=ExperimentalWarning",
  // Reaching the stack of async ids on Node 20 and 22 goes through process.binding.
  "--disable-warning=DEP0111",
];

/** The built file of an entry, also when this file runs from source. */
function entry(name: string): string {
  const here = import.meta.url;
  const built = here.endsWith(".ts") ? new URL(`../../dist/kernel/cell/${name}`, here) : new URL(`./${name}`, here);
  return fileURLToPath(built);
}

/** Starts the process that runs the user's code, in a process group of its own. */
export function launchCells(cwd: string, memoryLimit?: number): ChildProcess {
  const limit = memoryLimit === undefined ? [] : [`--max-old-space-size=${memoryLimit}`];
  return spawn(process.execPath, [...CELL_FLAGS, ...limit, entry("child/main.js"), cwd], {
    cwd,
    detached: process.platform !== "win32",
    stdio: ["ignore", "pipe", "pipe", "pipe", "pipe", "pipe"],
  });
}

/** Starts the process that checks cells. */
export function launchTypes(cwd: string): ChildProcess {
  return spawn(process.execPath, ["--disable-warning=ExperimentalWarning", entry("types/main.js"), cwd], {
    cwd,
    stdio: ["pipe", "pipe", "inherit"],
  });
}
