// What a confined cell may use before its process is ended.

export interface ConfinedLimits {
  /** Milliseconds of one cell. */
  readonly time: number;
  /** MB of memory of the process, whatever they are used for. */
  readonly memory: number;
  /** Characters of one message of the cells, and of all of one cell. */
  readonly message: number;
  readonly output: number;
}

export const CONFINED_LIMITS: ConfinedLimits = {
  time: 600_000,
  memory: 2048,
  message: 16_000_000,
  output: 64_000_000,
};
