// Lines for whoever reads the kernel's stderr. Never the key, never the content of a message.
import { writeSync } from "node:fs";

/** Lines a minute that `logDropped` writes at most: an attacker must not fill a disk through the log. */
const DROPS_A_MINUTE = 5;

/**
 * Bytes that `log` writes at most. A host may have given a pipe that it never reads: one that is full would stop this
 * thread, and with it heartbeat and interrupts. Pipes hold 64 kB.
 */
const LOG_BYTES = 48_000;

let minute = 0;
let written = 0;
let left = LOG_BYTES;

/** Writes one line to stderr, as long as there is room. A reader that is gone or slow is no reason to fail. */
export function log(line: string): void {
  const text = `halfperiod: ${line}\n`;
  if (left <= 0) return;
  left -= Buffer.byteLength(text);
  try {
    writeSync(2, left > 0 ? text : "halfperiod: no more lines are written to this log.\n");
  } catch {
    // closed or full: the line is lost, the kernel goes on
  }
}

/** Tells of a message that was dropped, at most a few times a minute. */
export function logDropped(channel: string, reason: string): void {
  const now = Math.floor(Date.now() / 60_000);
  if (now !== minute) {
    minute = now;
    written = 0;
  }
  written += 1;
  if (written <= DROPS_A_MINUTE) log(`dropped a message on ${channel}: ${reason}`);
}
