// Builds the start-up snapshot of the types process.
import { spawnSync } from "node:child_process";
import { existsSync, mkdirSync, renameSync, rmSync } from "node:fs";
import { createRequire } from "node:module";
import { dirname, join } from "node:path";
import { BUILT, ROOT, SNAPSHOT } from "./file.ts";

/** The one script that a snapshot starts from: the compiler and our modules, put together at set-up. */
const SCRIPT = join(BUILT, "start", "types.cjs");

/** Builds the snapshot; answers what went wrong, or undefined. */
export function buildSnapshot(): string | undefined {
  if (!existsSync(SCRIPT)) return `no ${SCRIPT}`;
  const compiler = createRequire(import.meta.url).resolve("typescript");
  const fresh = `${SNAPSHOT}.${process.pid}`;
  mkdirSync(dirname(SNAPSHOT), { recursive: true });
  try {
    const flags = ["--snapshot-blob", fresh, "--build-snapshot"];
    const made = spawnSync(process.execPath, [...flags, SCRIPT, ROOT, compiler], { encoding: "utf8" });
    if (made.status !== 0) return made.stderr;
    renameSync(fresh, SNAPSHOT);
    return undefined;
  } finally {
    rmSync(fresh, { force: true });
  }
}
