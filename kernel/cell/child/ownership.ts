// Which cell a piece of running code belongs to, also long after the cell has ended.
import { AsyncLocalStorage } from "node:async_hooks";

/** The start of a cell, carried by everything that it starts. */
export interface Owner {
  readonly cell: number;
  readonly allowStdin: boolean;
  /** The cell was interrupted: its timers do nothing more. */
  stopped: boolean;
}

const storage = new AsyncLocalStorage<Owner>();
let latest: Owner = { cell: 0, allowStdin: false, stopped: false };

/** Runs `body` as the start of a cell. */
export function own<T>(owner: Owner, body: () => T): T {
  latest = owner;
  return storage.run(owner, body);
}

/** The cell that started the running code; the latest one where that is not known. */
export function currentOwner(): Owner {
  return storage.getStore() ?? latest;
}

/** The cell that started the running code, undefined where that is not known. */
export function knownOwner(): Owner | undefined {
  return storage.getStore();
}
