// The built kernel as a process of its own, as a host starts it.
import { type ChildProcess, spawn } from "node:child_process";
import { existsSync, mkdtempSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { type ConnectionFields, freeConnection } from "./client.ts";

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), "../..");
export const KERNEL_ENTRY = path.join(root, "kernel/bin/kernel.cjs");

/** Builds if a source is newer than the build. */
export async function build(): Promise<void> {
  // @ts-expect-error: plain JavaScript, which has to run before anything is installed
  const { setUp } = await import("../../kernel/bin/setup.mjs");
  setUp();
}

export interface KernelProcess {
  readonly child: ChildProcess;
  readonly pid: number;
  readonly fields: ConnectionFields;
  readonly file: string;
  /** Exit status or the signal that ended it. */
  readonly exited: Promise<number | string>;
  errors(): string;
}

export async function startProcess(fields?: ConnectionFields, env: NodeJS.ProcessEnv = {}): Promise<KernelProcess> {
  const connection = fields ?? (await freeConnection());
  const file = connectionFile(JSON.stringify(connection));
  return { ...startWith(["-f", file], env), fields: connection, file };
}

export function connectionFile(text: string): string {
  const file = path.join(mkdtempSync(path.join(tmpdir(), "halfperiod ")), "kernel é.json");
  writeFileSync(file, text, { mode: 0o600 });
  return file;
}

/** Starts the kernel with these arguments. */
export function startWith(args: readonly string[], env: NodeJS.ProcessEnv = {}) {
  const child = spawn(process.execPath, [KERNEL_ENTRY, ...args], {
    stdio: ["ignore", "pipe", "pipe"],
    env: { ...process.env, HALFPERIOD_HISTORY: "off", ...env },
    detached: true,
  });
  let text = "";
  child.stderr.on("data", (chunk) => {
    text += chunk;
  });
  child.stdout.resume();
  const exited = new Promise<number | string>((resolve) => {
    child.on("exit", (code, signal) => resolve(code ?? signal ?? "?"));
  });
  return { child, pid: child.pid as number, exited, errors: () => text };
}

/**
 * True while a process of the group lives. The kernel is a leader of its group, as under a host. A dead process that
 * nobody has waited for yet does not count: when the host is dead too, that is up to the system.
 */
export function groupLives(pid: number): boolean {
  if (existsSync("/proc/self/stat")) return readdirSync("/proc").some((name) => isLiveMember(name, pid));
  try {
    process.kill(-pid, 0);
    return true;
  } catch {
    return false;
  }
}

function isLiveMember(name: string, group: number): boolean {
  if (!/^\d+$/.test(name)) return false;
  try {
    const stat = readFileSync(`/proc/${name}/stat`, "latin1");
    const [state, , pgrp] = stat.slice(stat.lastIndexOf(")") + 2).split(" ");
    return Number(pgrp) === group && state !== "Z" && state !== "X";
  } catch {
    return false; // ended between the listing and the look
  }
}
