// How the two processes of a session are started.
import { type ChildProcess, spawn } from "node:child_process";
import { join } from "node:path";
import { withCertificates, withoutCertificates } from "./certificates.ts";
import { BUILT, ROOT, usableSnapshot } from "./snapshot/file.ts";

/** Flags of the cells' process: what interrupts need (see child/stop.ts), and two warnings less. */
const CELL_FLAGS = [
  "--no-force-async-hooks-checks",
  "--expose-internals",
  "--disable-warning=ExperimentalWarning",
  // Reaching the stack of async ids on Node 20 and 22 goes through process.binding.
  "--disable-warning=DEP0111",
];

/** Tells the types process that the notebook is confined. */
export const CONFINED = "confined";

/** Starts from a bundle where there is one. */
const CELLS_ENTRY = join(ROOT, "kernel", "bin", "cells.cjs");

/** Starts the process that runs the user's code, in a process group of its own; `memoryLimit` in MB. */
export function launchCells(cwd: string, memoryLimit?: number): ChildProcess {
  const limit = memoryLimit === undefined ? [] : [`--max-old-space-size=${memoryLimit}`];
  const watched = memoryLimit === undefined ? [] : [String(memoryLimit)];
  return spawn(process.execPath, [...CELL_FLAGS, ...limit, CELLS_ENTRY, cwd, ...watched], {
    cwd,
    env: withCertificates(process.env),
    detached: process.platform !== "win32",
    stdio: ["ignore", "pipe", "pipe", "pipe", "pipe", "pipe"],
  });
}

/** A types process, and whether it starts from the snapshot. */
export interface LaunchedTypes {
  readonly process: ChildProcess;
  readonly fromSnapshot: boolean;
}

let early: { readonly cwd: string; readonly confined: boolean; readonly launched: LaunchedTypes } | undefined;

/** Starts a types process before there is a session; the first session in that folder gets it. */
export function launchTypesEarly(cwd: string, confined: boolean): void {
  const launched = startTypes(cwd, usableSnapshot(), confined);
  launched.process.on("error", () => {});
  early = { cwd, confined, launched };
}

/** Starts the process that checks cells; from the start-up snapshot if there is one and it is wanted. */
export function launchTypes(cwd: string, wantSnapshot: boolean, confined: boolean): LaunchedTypes {
  const ready = early;
  if (wantSnapshot && ready?.cwd === cwd && ready.confined === confined) {
    early = undefined;
    return ready.launched;
  }
  return startTypes(cwd, wantSnapshot ? usableSnapshot() : undefined, confined);
}

function startTypes(cwd: string, snapshot: string | undefined, confined: boolean): LaunchedTypes {
  const start =
    snapshot === undefined ? [join(BUILT, "kernel", "cell", "types", "main.js")] : ["--snapshot-blob", snapshot];
  const child = spawn(
    process.execPath,
    ["--disable-warning=ExperimentalWarning", ...start, cwd, ...(confined ? [CONFINED] : [])],
    {
      cwd,
      env: withoutCertificates(process.env),
      // A snapshot that does not fit is refused with words that help nobody: the plain start follows.
      stdio: ["pipe", "pipe", snapshot === undefined ? "inherit" : "ignore"],
    },
  );
  return { process: child, fromSnapshot: snapshot !== undefined };
}
