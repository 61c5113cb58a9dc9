// Publishing without loss to clients that read, and without waiting for ever for one that does not.
import type { Sender } from "./queue.ts";

/**
 * The part of an XPUB socket that is needed here. Its sendTimeout is 0, it holds a bounded number of messages, and
 * noDrop is set.
 */
export interface Publisher extends Sender {
  /** True: a send fails with EAGAIN while a subscriber's share is full. False: it leaves that subscriber out. */
  noDrop: boolean;
}

/** How long everybody waits for one subscriber that takes nothing, in ms, before messages go on without it. */
const STALL = 10_000;
/** How long each message waits while such a subscriber is connected: time for the others to keep up. */
const LEFT_BEHIND = 20;
/** Between two tries, in ms. */
const AGAIN = 4;

/**
 * Sends like the socket, but waits while a subscriber cannot take more: that is what slows a cell that prints faster
 * than it is read. A client that does not read at all, a suspended one for instance, misses messages after `STALL`;
 * as soon as every subscriber takes messages again, all are waited for as before.
 */
export function patiently(socket: Publisher, wait: (ms: number) => Promise<void> = sleep): Sender {
  let patience = STALL;
  return {
    get closed() {
      return socket.closed;
    },
    async send(frames) {
      for (let waited = 0; ; waited += AGAIN) {
        if (await taken(socket, frames)) {
          if (waited === 0) patience = STALL;
          return;
        }
        if (socket.closed) return;
        if (waited >= patience) return leaveBehind(frames);
        await wait(AGAIN);
      }
    },
  };

  async function leaveBehind(frames: Buffer[]): Promise<void> {
    patience = LEFT_BEHIND;
    setNoDrop(socket, false);
    try {
      await socket.send(frames);
    } finally {
      if (!socket.closed) setNoDrop(socket, true);
    }
  }
}

// The binding warns that options of a bound socket have no effect until the next bind. This one has at once, in the
// library that it binds, and the warning is given while the option is set: so it is kept back for so long.
function setNoDrop(socket: Publisher, value: boolean): void {
  const { emitWarning } = process;
  process.emitWarning = () => {};
  try {
    socket.noDrop = value;
  } finally {
    process.emitWarning = emitWarning;
  }
}

async function taken(socket: Publisher, frames: Buffer[]): Promise<boolean> {
  try {
    await socket.send(frames);
    return true;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "EAGAIN") return false;
    throw error;
  }
}

function sleep(ms: number): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, ms));
}
