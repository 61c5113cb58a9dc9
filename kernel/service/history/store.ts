// What was entered: the stored cells of this session, behind those of earlier ones.
import { within } from "../within.ts";

export interface Entry {
  readonly session: number;
  readonly line: number;
  readonly input: string;
  /** Text of the result; known for this session only. */
  output: string | null;
}

export interface History {
  /** Number of this session. */
  readonly session: number;
  add(line: number, input: string): Entry;
  /** All entries, oldest first; of earlier sessions and of this one. */
  entries(): readonly Entry[];
  close(): Promise<void>;
}

/** Where sessions are kept beyond the process. */
export interface HistoryFile {
  /** Entries of earlier sessions, oldest first, and the number of this one. Never rejects: what cannot be read is not there. */
  load(): Promise<{ readonly session: number; readonly entries: readonly Entry[] }>;
  /** Keeps an entry of this session. Never throws. */
  append(entry: Entry): void;
  /** Resolves when all is kept that can be. */
  close(): Promise<void>;
}

/** How long a disk may take to give earlier sessions, in ms; the first cell waits for them. */
const LOADING = 1000;
const NOTHING = { session: 1, entries: [] };

/** A history on top of `file`; without one it is of this process only. */
export async function openHistory(file?: HistoryFile): Promise<History> {
  const { session, entries } = file ? await within(LOADING, file.load(), NOTHING) : NOTHING;
  const all = [...entries];
  return {
    session,
    add(line, input) {
      const entry: Entry = { session, line, input, output: null };
      all.push(entry);
      file?.append(entry);
      return entry;
    },
    entries: () => all,
    close: async () => file?.close(),
  };
}
