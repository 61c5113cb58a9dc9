// The guard of confined cells, itself unconfined: starts their process, counts time and memory, ends it when it is told
// to, when a limit is passed, and when the kernel is gone (its standard input closes).
import { type ChildProcess, spawn, spawnSync } from "node:child_process";
import { readFileSync } from "node:fs";
import { platform } from "node:os";
import { LineReader } from "../lines.ts";
import { confinedFlags } from "./flags.ts";

/** From the kernel: a cell begins, a cell has ended, end the process. */
export type GuardCommand = { readonly kind: "cell" } | { readonly kind: "idle" } | { readonly kind: "kill" };

const LOOK = 50;

function main([bundle = "", time = "0", memory = "0"]: readonly string[]): void {
  process.on("SIGINT", () => {});
  process.on("SIGTERM", () => {});
  process.on("SIGUSR1", () => {});
  const child = spawn(process.execPath, [...confinedFlags(bundle, Number(memory)), bundle], {
    env: {},
    cwd: "/",
    stdio: ["ignore", "ignore", "pipe", 3, 4],
  });
  const stop = endOf(child);
  const clock = clockOf(Number(time), () => stop("time"));
  const watch = setInterval(() => {
    if (residentMegabytes(child.pid ?? 0) > Number(memory)) stop("memory");
  }, LOOK);
  watch.unref();
  // Node's last words about its heap; anything else that the process could write here is dropped.
  child.stderr?.setEncoding("utf8").on("data", (text: string) => {
    if (/FATAL ERROR: .*(?:heap|memory|allocation)/.test(text)) tell("memory");
  });
  const reader = new LineReader();
  process.stdin.on("data", (chunk: Buffer) => {
    for (const line of reader.push(chunk)) {
      const { kind } = JSON.parse(line) as GuardCommand;
      if (kind === "kill") stop("stopped");
      else clock(kind === "cell");
    }
  });
  process.stdin.on("end", () => stop("kernel gone"));
  process.stdin.on("error", () => stop("kernel gone"));
}

/** Ends the process for the first reason given; this process follows it. */
function endOf(child: ChildProcess): (reason: string) => void {
  let ending = false;
  child.on("exit", (code, signal) => {
    tell(signal ? `signal ${signal}` : `status ${code}`);
    process.exit(0);
  });
  child.on("error", () => process.exit(1));
  return (reason) => {
    if (ending) return;
    ending = true;
    tell(reason);
    child.kill("SIGKILL");
  };
}

/** Counts the time of the running cell. */
function clockOf(limit: number, late: () => void): (running: boolean) => void {
  let timer: NodeJS.Timeout | undefined;
  return (running) => {
    clearTimeout(timer);
    timer = running ? setTimeout(late, limit) : undefined;
  };
}

function tell(reason: string): void {
  try {
    process.stdout.write(`${reason}\n`);
  } catch {
    // Nobody listens any more.
  }
}

/** Memory of a process that is really there, in MB; 0 where it cannot be told. */
function residentMegabytes(pid: number): number {
  try {
    if (platform() === "linux") {
      return Number(/VmRSS:\s*(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, "utf8"))?.[1]) / 1e3;
    }
    if (platform() === "win32") return 0;
    return Number(spawnSync("ps", ["-o", "rss=", "-p", String(pid)], { encoding: "utf8" }).stdout) / 1e3;
  } catch {
    return 0;
  }
}

main(process.argv.slice(2));
