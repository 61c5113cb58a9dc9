// Process "cells": runs the user's code. Commands come on descriptor 3, reports leave on 4, interrupts come on 5.
import { Socket } from "node:net";
import { MessageChannel, Worker } from "node:worker_threads";
import { LineReader } from "../lines.ts";
import type { ChildCommand } from "../messages.ts";
import { Boxes } from "./box.ts";
import { formatConsole } from "./console.ts";
import { failure } from "./failure.ts";
import { Frames } from "./frames.ts";
import { connectHost } from "./host.ts";
import { announceLeaving } from "./leaving.ts";
import { bundler, library } from "./library.ts";
import { Modules } from "./modules.ts";
import { currentOwner } from "./ownership.ts";
import { Reporter } from "./report.ts";
import { Runner } from "./runner.ts";
import { PONG, SHARED_LENGTH, type WatchdogMessage } from "./shared.ts";
import { Stopper } from "./stop.ts";
import { captureStreams } from "./streams.ts";
import { guardTimers } from "./timers.ts";
import { formatter } from "./value.ts";

const cwd = process.argv[2] ?? process.cwd();
/** Limit of the memory in MB, if there is one. */
const memory = Number(process.argv[3] ?? Number.POSITIVE_INFINITY);
const state = new SharedArrayBuffer(SHARED_LENGTH * Int32Array.BYTES_PER_ELEMENT);
const shared = new Int32Array(state);
const reporter = new Reporter(shared);
const frames = new Frames();

/** How long the watchdog may be put off, in ms: its start would hold up that of the session. */
const WATCHDOG_BY = 500;
let watched = false;

/** Starts the watchdog, once; its messages arrive whenever the event loop is free. */
function startWatchdog(runner: Runner): void {
  if (watched) return;
  watched = true;
  const { port1, port2 } = new MessageChannel();
  const data = { port: port2, state, group: process.platform !== "win32", memory };
  // No execArgv of the main thread: its memory limit is not meant for this one.
  const worker = new Worker(new URL("./watchdog.js", import.meta.url), { workerData: data, transferList: [port2] });
  worker.unref();
  port1.on("message", (message: WatchdogMessage) => {
    if (message.kind === "soft") runner.interrupt(message.cell);
    else {
      Atomics.store(shared, PONG, message.number);
      runner.afterStop(message.cell);
    }
  });
}

/** Errors outside the flow of a cell appear under the cell that started the code, and end nothing. */
function reportStrays(): void {
  const stray = (words: string) => (error: unknown) => {
    const { traceback } = failure(error, frames);
    reporter.stream(currentOwner().cell, "stderr", `${words}\n${traceback.join("\n")}\n`);
  };
  process.on("uncaughtException", stray("An error outside the flow of the cell:"));
  process.on("unhandledRejection", stray("A promise was rejected and nothing handled it:"));
  process.on("SIGINT", () => {});
}

/** The few names that Node's types promise and a script lacks. */
function addGlobals(modules: Modules): void {
  const define = (name: string, value: unknown) =>
    Object.defineProperty(globalThis, name, { value, writable: true, configurable: true, enumerable: false });
  define("require", modules.require);
  define("__dirname", cwd);
  define("__filename", modules.meta.filename);
}

function readCommands(runner: Runner, answer: (value: string | null) => void): void {
  const reader = new LineReader();
  const commands = new Socket({ fd: 3, readable: true, writable: false });
  // Later on the watchdog sees the kernel go, also while a cell runs.
  commands.on("end", () => watched || process.kill(process.pid, "SIGKILL"));
  commands.on("data", (chunk: Buffer) => {
    for (const line of reader.push(chunk)) {
      const command = JSON.parse(line) as ChildCommand;
      if (command.kind === "run") {
        startWatchdog(runner);
        runner.run(command);
      } else if (command.kind === "peek") runner.peek(command.id, command.name);
      else answer(command.value);
    }
  });
}

function main(): void {
  process.chdir(cwd);
  reportStrays();
  captureStreams(reporter);
  guardTimers();
  formatConsole();
  announceLeaving(reporter);
  const modules = new Modules(cwd, library);
  const bundle = formatter(bundler);
  const stops = new Stopper({ frames, shared, critical: () => reporter.critical });
  const runner = new Runner({ cwd, boxes: new Boxes(library), modules, frames, reporter, shared, bundle, stops });
  const machine = Object.freeze({
    enter: () => runner.enter(),
    stop: (cell: number, level: 0 | 1 | 2) => stops.stop(cell, level),
    where: (cell: number) => stops.where(cell),
    rung: stops.rung,
  });
  Object.defineProperty(globalThis, "__cells", { value: machine, enumerable: false });
  addGlobals(modules);
  frames.install();
  setTimeout(startWatchdog, WATCHDOG_BY, runner).unref();
  const answer = connectHost(reporter, runner);
  readCommands(runner, answer);
  reporter.send({ kind: "ready" });
}

main();
