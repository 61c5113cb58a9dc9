// State that the main thread of the cells and its watchdog share, as 32-bit integers.

/** Index of the phase of the running cell. */
export const PHASE = 0;
/** Index of the number of the running cell, 0 between cells. */
export const CELL = 1;
/** Index of the last ping that the event loop of the main thread has answered. */
export const PONG = 2;
/** Index of a count: how often the main thread has noted the place where it is. */
export const NOTED = 3;
export const SHARED_LENGTH = 4;

/** Phases. Only in SYNC may a signal be sent, and only by who swaps SYNC for FIRING. */
export const IDLE = 0;
/** User code runs inside the boundary that a signal breaks. */
export const SYNC = 1;
/** The watchdog has sent, or is about to send, the signal. */
export const FIRING = 2;
/** The boundary has been left: the cell awaits, or is over. */
export const LEFT = 3;
/** A report is being written: no signal now. */
export const WRITING = 4;

/** From the watchdog to the main thread. */
export type WatchdogMessage =
  | { readonly kind: "soft"; readonly cell: number }
  | { readonly kind: "ping"; readonly cell: number; readonly number: number };
