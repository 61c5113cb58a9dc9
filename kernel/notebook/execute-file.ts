// A notebook file, run from beginning to end in a kernel of its own.
import path from "node:path";
import { KernelClient } from "./client.ts";
import { cleanOutputs } from "./confined.ts";
import { readNotebook } from "./file.ts";
import { kernelCommand, type LaunchOptions } from "./launch.ts";
import { type Screen, showProgress } from "./progress.ts";
import { type Run, runNotebook } from "./run.ts";

export interface ExecuteFileOptions {
  /** Where progress is shown. */
  readonly screen: Screen;
  /** Milliseconds a cell may take. */
  readonly limit?: number | undefined;
  /** Proved digits to ask for, over what the notebook says. */
  readonly digits?: number | undefined;
  /** The cells get the language and the library alone, and what they show is cleaned. */
  readonly confined?: boolean | undefined;
  /** Another kernel than this package's. */
  readonly command?: LaunchOptions["command"];
}

/** Milliseconds that checking and running a confined cell may take if nothing else is said. */
const CONFINED_LIMIT = 600_000;

/** The run was stopped from outside, by Ctrl-C or a signal; nothing was written. */
export class Interrupted extends Error {
  constructor() {
    super("interrupted; nothing was written");
    this.name = "Interrupted";
  }
}

/** Reads the notebook, runs it in a fresh kernel started in its folder, and ends that kernel whatever happens. */
export async function executeFile(file: string, options: ExecuteFileOptions): Promise<Run> {
  const { screen, digits, confined = false } = options;
  const limit = options.limit ?? (confined ? CONFINED_LIMIT : undefined);
  const command = options.command ?? (confined ? [...kernelCommand(), "--confined"] : undefined);
  const notebook = await readNotebook(file);
  const progress = showProgress(path.basename(file), screen);
  const stop = stopOnSignals();
  try {
    const client = await KernelClient.start({
      cwd: path.dirname(path.resolve(file)),
      ...(command ? { command } : {}),
      // What a person typed is history; what a command runs is not.
      env: { HALFPERIOD_HISTORY: "off", ...(digits === undefined ? {} : { HALFPERIOD_DIGITS: String(digits) }) },
    });
    try {
      const { signal, stopped } = stop;
      const stamp = { folder: path.dirname(file), digits };
      const run = await Promise.race([stopped, runNotebook(notebook, client, { ...progress, limit, signal, stamp })]);
      return confined ? { ...run, notebook: cleanOutputs(run.notebook) } : run;
    } finally {
      await client.shutdown();
    }
  } finally {
    stop.release();
    progress.end();
  }
}

interface Stop {
  readonly signal: AbortSignal;
  /** Rejects with Interrupted when a signal comes. */
  readonly stopped: Promise<never>;
  release(): void;
}

function stopOnSignals(): Stop {
  const controller = new AbortController();
  const { signal } = controller;
  const stopped = new Promise<never>((_, reject) => {
    signal.addEventListener("abort", () => reject(new Interrupted()));
  });
  stopped.catch(() => {});
  const stop = () => controller.abort();
  const signals = ["SIGINT", "SIGTERM", "SIGHUP"] as const;
  for (const name of signals) process.on(name, stop);
  return {
    signal,
    stopped,
    release() {
      for (const name of signals) process.off(name, stop);
    },
  };
}
