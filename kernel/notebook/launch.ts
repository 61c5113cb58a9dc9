// The kernel as a process of its own: ports, connection file, start and end.
import { type ChildProcess, spawn } from "node:child_process";
import { randomBytes } from "node:crypto";
import { mkdtemp, rm, writeFile } from "node:fs/promises";
import net from "node:net";
import os from "node:os";
import path from "node:path";
import { certificatesAside } from "../cell/certificates.ts";
import { kernelEntry } from "../service/install/kernelspec.ts";
import { CHANNELS, type Connection, parseConnection } from "../wire/connection.ts";

const HOST = "127.0.0.1";
/** Kept of what the kernel process itself writes, to show if it dies. */
const STDERR_KEPT = 8192;

export interface LaunchOptions {
  /** Working folder of the kernel: that of the notebook. */
  readonly cwd: string;
  /** Program and arguments in front of `-f FILE`; the built kernel of this package if absent. */
  readonly command?: readonly string[];
  /** Added to the environment. */
  readonly env?: Readonly<Record<string, string>>;
}

/** How a kernel process ended, and the last that it wrote to its stderr. */
export interface KernelEnd {
  readonly code: number | null;
  readonly signal: NodeJS.Signals | null;
  readonly stderr: string;
}

export interface KernelProcess {
  readonly pid: number;
  readonly connection: Connection;
  /** Settles when the process has ended; never rejects. */
  readonly ended: Promise<KernelEnd>;
  /** Sends a signal to the kernel and all that it started. */
  signal(name: NodeJS.Signals): void;
  /** Removes the connection file. */
  dispose(): Promise<void>;
}

/** The command that starts the built kernel of this package, without the connection file. */
export function kernelCommand(): readonly string[] {
  return [process.execPath, kernelEntry];
}

/** Starts a kernel process on free ports. The connection file is readable by this user only, in a folder of its own. */
export async function launchKernel({
  cwd,
  command = kernelCommand(),
  env = {},
}: LaunchOptions): Promise<KernelProcess> {
  const folder = await mkdtemp(path.join(os.tmpdir(), "halfperiod-"));
  const dispose = () => rm(folder, { recursive: true, force: true });
  try {
    const file = path.join(folder, "connection.json");
    const text = await connectionText();
    await writeFile(file, text, { mode: 0o600, flag: "wx" });
    const [program = process.execPath, ...args] = command;
    const child = spawn(program, [...args, "-f", file], {
      cwd,
      // what a command runs is not what the user entered, so it stays out of the history
      env: {
        ...process.env,
        ...certificatesAside(process.env),
        HALFPERIOD_HISTORY: "off",
        ...env,
        JPY_PARENT_PID: String(process.pid),
      },
      stdio: ["ignore", "ignore", "pipe"],
      // Its own group, so that a Ctrl-C meant for this program does not reach it first, and all of it can be ended.
      detached: process.platform !== "win32",
    });
    await started(child);
    const pid = child.pid ?? 0;
    const signal = (name: NodeJS.Signals) => signalGroup(pid, name);
    return { pid, connection: parseConnection(text, file), ended: watch(child), signal, dispose };
  } catch (error) {
    await dispose();
    throw error;
  }
}

async function connectionText(): Promise<string> {
  const ports = await freePorts(CHANNELS.length);
  return JSON.stringify({
    transport: "tcp",
    ip: HOST,
    ...Object.fromEntries(CHANNELS.map((channel, index) => [`${channel}_port`, ports[index]])),
    signature_scheme: "hmac-sha256",
    key: randomBytes(32).toString("hex"),
    kernel_name: "halfperiod",
  });
}

/** Ports that were free a moment ago, all different. */
export async function freePorts(count: number): Promise<number[]> {
  const servers = await Promise.all(Array.from({ length: count }, listen));
  const ports = servers.map((server) => (server.address() as net.AddressInfo).port);
  await Promise.all(servers.map((server) => new Promise((resolve) => server.close(resolve))));
  return ports;
}

function listen(): Promise<net.Server> {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.once("error", reject);
    server.listen(0, HOST, () => resolve(server));
  });
}

function started(child: ChildProcess): Promise<void> {
  return new Promise((resolve, reject) => {
    child.once("spawn", resolve);
    child.once("error", (error) => reject(new Error(`the kernel could not be started: ${error.message}`)));
  });
}

function watch(child: ChildProcess): Promise<KernelEnd> {
  let stderr = "";
  child.stderr?.setEncoding("utf8").on("data", (text: string) => {
    stderr = (stderr + text).slice(-STDERR_KEPT);
  });
  // "exit" rather than "close": a process that outlives the kernel may hold its stderr open.
  return new Promise((resolve) => {
    child.once("exit", (code, signal) => setImmediate(() => resolve({ code, signal, stderr: stderr.trim() })));
  });
}

function signalGroup(pid: number, name: NodeJS.Signals): void {
  try {
    process.kill(process.platform === "win32" ? pid : -pid, name);
  } catch {
    // It has ended already.
  }
}
