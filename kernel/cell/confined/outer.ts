// The program around the realm, in a process without rights: hands texts in and out, and runs nothing itself.
//
// Only strings, numbers and the few functions below cross. Whatever comes out of the realm by another way (a thrown or
// rejected object) is never looked at: reading a field of it would run code of the realm with objects of this side.
import { writeSync } from "node:fs";
import { Socket } from "node:net";
import { CONFINED_LIMITS } from "./limits.ts";

/** What the realm's script gives: takes the functions that cross, returns the one that takes a command. */
type Start = (say: (text: unknown) => void, later: (id: unknown, delay: unknown) => void) => (command: string) => void;

interface Realm {
  evaluate(source: string): unknown;
}

const COMMANDS = 3;
const REPORTS = 4;
const LONGEST_DELAY = 2 ** 31 - 1;

/** Runs the realm's script and serves it until the commands end. */
export function run(script: string): void {
  const missing = missingFence();
  if (missing !== undefined) {
    write(JSON.stringify({ kind: "refused", words: missing }));
    process.exit(3);
  }
  for (const name of ["uncaughtException", "unhandledRejection"] as const) process.on(name, () => {});
  const { ShadowRealm } = globalThis as unknown as { ShadowRealm: new () => Realm };
  const start = new ShadowRealm().evaluate(script) as Start;
  const take = start(say, (id, delay) => later(take, id, delay));
  readCommands(take);
  write(JSON.stringify({ kind: "ready" }));
}

/** Why the cells cannot be confined here; undefined if both fences stand. */
function missingFence(): string | undefined {
  if (!("ShadowRealm" in globalThis)) return "this Node has no ShadowRealm";
  const { permission } = process as unknown as { permission?: { has(scope: string): boolean } };
  if (!permission) return "this Node has no permission model, or it is off";
  const open = ["fs.read", "fs.write", "child", "worker"].filter((scope) => permission.has(scope));
  return open.length > 0 ? `the permission model leaves ${open.join(", ")} open` : undefined;
}

function say(text: unknown): void {
  if (typeof text !== "string") return;
  if (text.length > CONFINED_LIMITS.message) {
    write(JSON.stringify({ kind: "leaving", words: "the cell gave more output than a confined cell may" }));
    process.exit(4);
  }
  write(text.replaceAll("\n", " "));
}

function later(take: (command: string) => void, id: unknown, delay: unknown): void {
  if (typeof id !== "number" || typeof delay !== "number") return;
  setTimeout(() => hand(take, JSON.stringify({ kind: "timer", id })), Math.min(Math.max(0, delay), LONGEST_DELAY));
}

function readCommands(take: (command: string) => void): void {
  let rest = "";
  const socket = new Socket({ fd: COMMANDS, readable: true, writable: false });
  socket.setEncoding("utf8");
  socket.on("data", (chunk: string) => {
    const lines = (rest + chunk).split("\n");
    rest = lines.pop() ?? "";
    for (const line of lines) hand(take, line);
  });
  socket.on("end", () => process.exit(0));
}

/** Calls into the realm. What it throws is not looked at: the realm reports the failures of cells itself. */
function hand(take: (command: string) => void, line: string): void {
  try {
    take(line);
  } catch {
    write(JSON.stringify({ kind: "fault" }));
  }
}

function write(line: string): void {
  const bytes = Buffer.from(`${line}\n`);
  for (let from = 0; from < bytes.length; ) {
    try {
      from += writeSync(REPORTS, bytes, from);
    } catch (error) {
      const { code } = error as NodeJS.ErrnoException;
      if (code !== "EAGAIN" && code !== "EINTR") process.exit(5);
    }
  }
}
