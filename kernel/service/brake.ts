// What makes a cell wait in its print call while clients are slow to read.

export interface Brake {
  /** The wait before more output may come: undefined if there is none, else open while too much is on the way. */
  wait(): Promise<void> | undefined;
  /** Lets output through for a while: a cell that waits inside a print call cannot be stopped until it is freed. */
  release(): void;
}

interface Outlet {
  readonly pendingBytes: number;
  published(): Promise<void>;
}

/** Output waits when so many bytes are on the way. */
const PENDING_BYTES = 8_000_000;
/** How long output passes after an interrupt, in ms: longer than the cells take to stop whatever runs. */
const RELEASED = 6000;

export function createBrake(outlet: Outlet, now: () => number = Date.now): Brake {
  const waiting = new Set<() => void>();
  let releasedUntil = 0;
  return {
    wait() {
      if (outlet.pendingBytes <= PENDING_BYTES || now() < releasedUntil) return undefined;
      return new Promise((resolve) => {
        const go = () => {
          waiting.delete(go);
          resolve();
        };
        waiting.add(go);
        void outlet.published().then(go);
      });
    },
    release() {
      releasedUntil = now() + RELEASED;
      for (const go of waiting) go();
    },
  };
}
