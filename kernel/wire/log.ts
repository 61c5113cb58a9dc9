// Lines for whoever reads the kernel's stderr. Never the key, never the content of a message.
import { writeSync } from "node:fs";

/** Lines a minute that `logDropped` writes at most: an attacker must not fill a disk through the log. */
const DROPS_A_MINUTE = 5;

let minute = 0;
let written = 0;

/** Writes one line to stderr. A reader that is gone or slow is no reason to fail. */
export function log(line: string): void {
  try {
    writeSync(2, `halfperiod: ${line}\n`);
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
