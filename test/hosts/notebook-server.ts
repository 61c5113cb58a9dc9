// Debian's classic notebook server on a free port of this machine, with a token of its own.
import { type ChildProcess, spawn } from "node:child_process";
import { randomBytes } from "node:crypto";
import { setTimeout as sleep } from "node:timers/promises";
import { freePorts } from "../../kernel/notebook/launch.ts";
import type { HostPlace } from "./hosts.ts";

export const NOTEBOOK_PROGRAM = "/usr/bin/jupyter-notebook";

export interface NotebookServer {
  /** Address of a path of the server, with the token. */
  url(path: string): string;
  stop(): Promise<void>;
}

/** Starts the server over a folder and waits until it answers. */
export async function startNotebookServer(place: HostPlace, folder: string): Promise<NotebookServer> {
  const token = randomBytes(16).toString("hex");
  const [port] = await freePorts(1);
  const args = [
    "--no-browser",
    "--allow-root",
    "--ip=127.0.0.1",
    `--port=${port}`,
    "--port-retries=0",
    `--NotebookApp.token=${token}`,
    `--notebook-dir=${folder}`,
  ];
  const server = spawn(NOTEBOOK_PROGRAM, args, { env: place.env, stdio: ["ignore", "ignore", "pipe"], detached: true });
  await answering(server);
  return {
    url: (path) => `http://127.0.0.1:${port}/${path}?token=${token}`,
    stop: () => stop(server),
  };
}

/** Resolves when the server announces itself on its stderr. */
function answering(server: ChildProcess): Promise<void> {
  return new Promise((resolve, reject) => {
    let said = "";
    server.stderr?.setEncoding("utf8").on("data", (text: string) => {
      said += text;
      if (/is running at/.test(said)) resolve();
    });
    server.once("exit", (code) => reject(new Error(`the notebook server ended with ${code}\n${said.slice(-3000)}`)));
  });
}

async function stop(server: ChildProcess): Promise<void> {
  const pid = server.pid;
  if (pid === undefined || server.exitCode !== null) return;
  const ended = new Promise((resolve) => server.once("exit", resolve));
  process.kill(pid, "SIGTERM"); // it ends its kernels first
  await Promise.race([ended, sleep(10_000)]);
  if (server.exitCode === null && server.signalCode === null) process.kill(-pid, "SIGKILL");
}
