// The watchdog: a worker that stops the main thread when the kernel asks, and ends the group when the kernel is gone or
// its memory is used up.
import { writeSync } from "node:fs";
import { Session } from "node:inspector";
import { Socket } from "node:net";
import { type MessagePort, workerData } from "node:worker_threads";
import { LineReader } from "../lines.ts";
import type { InterruptCommand } from "../messages.ts";
import { CELL, FIRING, NOTED, PHASE, PONG, SYNC, type WatchdogMessage, WRITING } from "./shared.ts";

const DESCRIPTOR = 5;
const STEP = 50;
/** After so many refused tries a stop takes code inside Node's own functions too. */
const PATIENCE = 30;
const SIGNAL_TIME = 1000;
/** A signal that lands inside the evaluation which notes the place would break that instead of the cell. */
const NOTE_TIME = 2000;
const UNCONDITIONAL_AFTER = 3000;
const KILL_AFTER = 5000;

/** What a process takes besides the heap and the buffers of the cells, in MB: Node itself, the library, this worker. */
const OVERHEAD = 200;
const LOOK_AT_MEMORY = 100;

const { port, state, group, memory } = workerData as {
  port: MessagePort;
  state: SharedArrayBuffer;
  group: boolean;
  memory: number;
};
const shared = new Int32Array(state);
let session: Session | undefined;
let pings = 0;
let stopping = 0;

function killAll(): void {
  if (group) {
    try {
      process.kill(-process.pid, "SIGKILL");
    } catch {
      // Not the leader of a group of its own.
    }
  }
  process.kill(process.pid, "SIGKILL");
}

const pause = (time: number) => new Promise<void>((resolve) => setTimeout(resolve, time));

function post(message: WatchdogMessage): void {
  port.postMessage(message);
}

/** Whether cell `number` runs, or has yet to begin. */
function isOpen(number: number): boolean {
  const running = Atomics.load(shared, CELL);
  return running === number || (running === 0 && stopping === number && Atomics.load(shared, PONG) < pings);
}

/** Stops cell `number` by ever stronger means. */
async function interrupt(number: number): Promise<void> {
  if (stopping === number) return;
  stopping = number;
  if (Atomics.load(shared, PHASE) === SYNC) await notePlace(number);
  const began = Date.now();
  fireSignal();
  post({ kind: "soft", cell: number });
  ping(number);
  await pause(STEP);
  for (let tries = 0; isOpen(number); tries++) {
    const elapsed = Date.now() - began;
    if (elapsed > KILL_AFTER) killAll();
    if (!fireSignal() && mayStop(elapsed)) stop(number, level(elapsed, tries));
    if (Atomics.load(shared, PONG) >= pings) ping(number);
    await pause(STEP);
  }
  if (stopping === number) stopping = 0;
}

function level(elapsed: number, tries: number): 0 | 1 | 2 {
  if (elapsed > UNCONDITIONAL_AFTER) return 2;
  return tries > PATIENCE ? 1 : 0;
}

/** Whether the stop protocol is next: the event loop does not answer, and no signal is on its way or soon can be. */
function mayStop(elapsed: number): boolean {
  if (Atomics.load(shared, PONG) >= pings) return false;
  const phase = Atomics.load(shared, PHASE);
  if (phase === FIRING) return elapsed >= SIGNAL_TIME;
  return phase !== WRITING || elapsed >= UNCONDITIONAL_AFTER;
}

/** SIGINT to this process, only while the main thread is inside the boundary that it breaks; answers whether. */
function fireSignal(): boolean {
  if (process.platform === "win32") return false;
  if (Atomics.compareExchange(shared, PHASE, SYNC, FIRING) !== SYNC) return false;
  process.kill(process.pid, "SIGINT");
  return true;
}

function ping(number: number): void {
  pings++;
  post({ kind: "ping", cell: number, number: pings });
}

function stop(number: number, strength: 0 | 1 | 2): void {
  evaluate(`__cells.stop(${number}, ${strength})`);
}

/** Lets the main thread note where it is; goes on without it if it does not come to that soon. */
async function notePlace(number: number): Promise<void> {
  const before = Atomics.load(shared, NOTED);
  evaluate(`__cells.where(${number})`);
  const until = Date.now() + NOTE_TIME;
  while (Atomics.load(shared, NOTED) === before && isOpen(number) && Date.now() < until) await pause(1);
}

/** Never awaits the reply: it may not come. */
function evaluate(expression: string): void {
  if (!session) {
    session = new Session();
    session.connectToMainThread();
  }
  session.post("Runtime.evaluate", { expression, silent: true });
}

/** V8 limits its heap by itself; buffers and typed arrays lie outside it. */
function limitMemory(): void {
  const most = (memory + OVERHEAD) * 2 ** 20;
  setInterval(() => {
    if (process.memoryUsage.rss() <= most) return;
    // In the words of V8, which the kernel knows.
    writeSync(2, "FATAL ERROR: the cells have more memory than they may\n");
    killAll();
  }, LOOK_AT_MEMORY).unref();
}

if (Number.isFinite(memory)) limitMemory();
const reader = new LineReader();
const socket = new Socket({ fd: DESCRIPTOR, readable: true, writable: false });
socket.on("data", (chunk: Buffer) => {
  for (const line of reader.push(chunk)) void interrupt((JSON.parse(line) as InterruptCommand).cell);
});
socket.on("end", killAll);
socket.on("error", killAll);
