// Publishing without loss to clients that read, and without waiting for ever for one that does not.
import type { Sender } from "./queue.ts";

/** The part of an XPUB socket that is needed here. Its sendTimeout is 0 and noDrop is set. */
export interface Publisher extends Sender {
  /** True: a send fails with EAGAIN while a subscriber's share is full. False: it leaves that subscriber out. */
  noDrop: boolean;
  /** Messages that the socket holds for one subscriber. */
  sendHighWaterMark: number;
}

/**
 * Bytes that the socket may hold for one subscriber. It counts messages, so the number of messages is fitted to their
 * size: a client that reads a thousand cells' messages only at the end misses none, a flood of text is held back.
 */
const HELD_BYTES = 64_000_000;
export const LEAST_HELD = 64;
const MOST_HELD = 1 << 20;
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
  const share = createShare(socket);
  return {
    get closed() {
      return socket.closed;
    },
    async send(frames) {
      share.count(frames.reduce((sum, frame) => sum + frame.length, 0));
      for (let waited = 0; ; ) {
        if (await taken(socket, frames)) {
          if (waited === 0) patience = STALL;
          return;
        }
        if (socket.closed) return;
        if (share.grow()) continue;
        if (waited >= patience) return leaveBehind(frames);
        await wait(AGAIN);
        waited += AGAIN;
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

/** Keeps the number of messages held such that their bytes stay under the limit. */
function createShare(socket: Publisher) {
  let held = LEAST_HELD;
  let sizes: number[] = []; // of the latest messages, at least `held` of them once there were so many
  let bytes = 0; // of the latest `held`
  const set = (messages: number) => {
    held = messages;
    socket.sendHighWaterMark = messages;
    sizes = sizes.slice(-messages);
    bytes = sizes.reduce((sum, size) => sum + size, 0);
  };
  return {
    count(size: number) {
      sizes.push(size);
      bytes += size;
      if (sizes.length > held) bytes -= sizes[sizes.length - 1 - held] as number;
      if (sizes.length > 2 * held) sizes = sizes.slice(-held);
      if (bytes > HELD_BYTES && held > LEAST_HELD) set(Math.max(LEAST_HELD, held >> 1));
    },
    /** More messages, if what is held leaves room for twice as many. */
    grow(): boolean {
      if (2 * bytes > HELD_BYTES || held >= MOST_HELD) return false;
      set(2 * held);
      return true;
    },
  };
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
