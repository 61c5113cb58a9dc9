// Where the one file is that confined cells may read.
import { spawnSync } from "node:child_process";
import { existsSync, realpathSync, statSync } from "node:fs";
import { join } from "node:path";
import { BUILT } from "../snapshot/file.ts";

/** A `.cjs` file: Node looks for no package.json around it, which it could not read. */
export const BUNDLE = join(BUILT, "confined", "cells.cjs");

/** Is it there, and not older than what it is made from? */
export function isBundleFresh(): boolean {
  const built = statSync(join(BUILT, ".tsbuildinfo"), { throwIfNoEntry: false })?.mtimeMs ?? 0;
  return existsSync(BUNDLE) && statSync(BUNDLE).mtimeMs >= built;
}

/** The file's real path; set-up builds it, and if that was left out it is built now, in a process of its own. */
export function confinedBundle(): string {
  if (!isBundleFresh()) {
    const { status, stderr } = spawnSync(process.execPath, [join(BUILT, "kernel/cell/confined/build.js")], {
      encoding: "utf8",
    });
    if (status !== 0) throw new Error(`the cells' file for confined runs could not be built: ${stderr}`);
  }
  return realpathSync(BUNDLE);
}
