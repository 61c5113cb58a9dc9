// One serial send queue a socket: the binding throws when a second send starts before the first has ended.

export interface Sender {
  readonly closed: boolean;
  send(frames: Buffer[]): Promise<void>;
}

export interface SendQueue {
  /** Takes the frames, in order, and returns at once. After the socket is closed it does nothing. */
  push(frames: Buffer[]): void;
  /** Resolves when all that was pushed before has been handed to the socket. */
  drained(): Promise<void>;
  /** Bytes taken and not yet handed to the socket. */
  readonly bytes: number;
}

/** Queue in front of `socket`; `onFault` hears of a send that failed, and the queue goes on. */
export function createSendQueue(socket: Sender, onFault: (error: unknown) => void): SendQueue {
  let last: Promise<void> = Promise.resolve();
  let bytes = 0;
  const sendOne = async (frames: Buffer[], size: number): Promise<void> => {
    try {
      if (!socket.closed) await socket.send(frames);
    } catch (error) {
      if (!socket.closed) onFault(error);
    } finally {
      bytes -= size;
    }
  };
  return {
    push(frames) {
      const size = frames.reduce((sum, frame) => sum + frame.length, 0);
      bytes += size;
      last = last.then(() => sendOne(frames, size));
    },
    drained: () => last,
    get bytes() {
      return bytes;
    },
  };
}
