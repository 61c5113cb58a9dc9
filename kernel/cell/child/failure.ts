// What was thrown, as the error of a cell.
import { inspect } from "node:util";
import { codeFrame } from "../codeframe.ts";
import type { ErrorReport } from "../port.ts";
import { describe, type Frame, type Frames, isLibrary } from "./frames.ts";

const RED = "\u001b[31m";
const PLAIN = "\u001b[0m";
const MOST_FRAMES = 12;
const DEEPEST_CAUSE = 3;

/** Report of anything that can be thrown, Errors or not. */
export function failure(thrown: unknown, frames: Frames): ErrorReport {
  try {
    return describeThrown(thrown, frames);
  } catch {
    // A proxy or a getter of the user's that throws in turn.
    const evalue = "a value that throws when it is looked at";
    return { ename: "Thrown", evalue, traceback: [`${RED}Thrown${PLAIN}: ${evalue}`] };
  }
}

function describeThrown(thrown: unknown, frames: Frames): ErrorReport {
  if (!(thrown instanceof Error)) {
    const evalue = text(thrown);
    const note = `  (${article(thrown)} was thrown, not an Error, so no place is known)`;
    return { ename: "Thrown", evalue, traceback: [`${RED}Thrown${PLAIN}: ${evalue}`, note] };
  }
  const ename = String(thrown.name || "Error");
  const evalue = frames.demangle(String(thrown.message));
  return { ename, evalue, traceback: errorLines(thrown, frames, 0) };
}

function errorLines(error: Error, frames: Frames, depth: number): string[] {
  const title = `${RED}${error.name || "Error"}${PLAIN}: ${frames.demangle(String(error.message))}`;
  const lines = [title, ...frameLines(frames.of(error))];
  if (error instanceof AggregateError && depth < DEEPEST_CAUSE) {
    for (const part of error.errors.slice(0, 5)) lines.push(...indented(part, frames, depth, "with"));
  }
  if (error.cause !== undefined && depth < DEEPEST_CAUSE)
    lines.push(...indented(error.cause, frames, depth, "caused by"));
  return lines;
}

function indented(part: unknown, frames: Frames, depth: number, word: string): string[] {
  const lines = part instanceof Error ? errorLines(part, frames, depth + 1) : [text(part)];
  return lines.map((line, index) => (index === 0 ? `${word} ${line}` : `  ${line}`));
}

/** Places from the innermost on; the code is shown once, at the innermost place in a cell. */
export function frameLines(all: readonly Frame[]): string[] {
  // Inside the library the user needs the call, not the way through it.
  const found = all.filter((frame) => frame.file === undefined || !isLibrary(frame.file));
  const lines: string[] = [];
  let shown = false;
  for (const frame of found.slice(0, MOST_FRAMES)) {
    lines.push(`  ${describe(frame)}`);
    if (shown || frame.code === undefined) continue;
    shown = true;
    lines.push(...codeFrame(frame.code, frame));
  }
  if (found.length > MOST_FRAMES) lines.push(`  and ${found.length - MOST_FRAMES} more calls`);
  return lines;
}

function text(value: unknown): string {
  return typeof value === "string" ? value : inspect(value, { depth: 2, breakLength: 120 });
}

function article(value: unknown): string {
  if (value === null || value === undefined) return String(value);
  return typeof value === "object" ? "an object" : `a ${typeof value}`;
}
