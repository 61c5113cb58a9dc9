// Sessions on disk: a private folder with one file a session, so that kernels that run at once never write to the same.
import { type FileHandle, mkdir, open, readdir, readFile, rm } from "node:fs/promises";
import { homedir } from "node:os";
import path from "node:path";
import { log } from "../../wire/log.ts";
import type { Entry, HistoryFile } from "./store.ts";

/** Bytes read at the start, newest sessions first: some ten thousand cells, a few tens of ms. */
const READ_BYTES = 4_000_000;
/** Sessions kept; the oldest are deleted. */
const SESSIONS = 2000;
/** A longer input is remembered while the kernel runs, but not kept. */
const LONGEST = 200_000;

/**
 * Folder of the history from the environment: HALFPERIOD_HISTORY names another one, or switches it off with "off".
 * Else where the system keeps the state of a user's programs.
 */
export function historyFolder(env: NodeJS.ProcessEnv, platform: NodeJS.Platform, home = homedir()): string | undefined {
  const chosen = env.HALFPERIOD_HISTORY;
  if (chosen === "off") return undefined;
  if (chosen) return path.resolve(chosen);
  if (platform === "win32")
    return path.join(env.LOCALAPPDATA ?? path.join(home, "AppData", "Local"), "halfperiod", "history");
  if (platform === "darwin") return path.join(home, "Library", "Application Support", "halfperiod", "history");
  return path.join(env.XDG_STATE_HOME || path.join(home, ".local", "state"), "halfperiod", "history");
}

/** History file of a new session in the folder. Nothing on disk is touched before it is loaded. */
export function createHistoryFile(folder: string): HistoryFile {
  let last: Promise<unknown> = Promise.resolve();
  let file: FileHandle | undefined;
  let torn = false; // a write that failed may have left half a line
  let told = false;
  let used = false;
  let own = 0;
  const write = async (entry: Entry) => {
    try {
      const line = `${torn ? "\n" : ""}${JSON.stringify([entry.line, entry.input])}\n`;
      torn = true;
      await file?.appendFile(line);
      torn = false;
    } catch (error) {
      if (!told)
        log(`the history cannot be kept (${(error as NodeJS.ErrnoException).code}); the kernel goes on without.`);
      told = true;
    }
  };
  return {
    async load() {
      try {
        await mkdir(folder, { recursive: true, mode: 0o700 });
        const earlier = await sessionNumbers(folder);
        const entries = await readSessions(folder, earlier);
        const claimed = await claim(folder, (earlier.at(-1) ?? 0) + 1);
        file = claimed.file;
        own = claimed.session;
        void forget(folder, earlier);
        return { session: claimed.session, entries };
      } catch (error) {
        log(`no history: ${folder} cannot be used (${(error as NodeJS.ErrnoException).code ?? error}).`);
        return { session: 1, entries: [] };
      }
    },
    append(entry) {
      used = true;
      if (entry.input.length <= LONGEST) last = last.then(() => write(entry));
    },
    async close() {
      await last;
      const opened = file;
      file = undefined;
      await opened?.close();
      // nothing was entered: the number is free again
      if (opened && !used) await rm(fileOf(folder, own), { force: true });
    },
  };
}

const fileOf = (folder: string, session: number) => path.join(folder, `${session}.jsonl`);

async function sessionNumbers(folder: string): Promise<number[]> {
  const names = await readdir(folder);
  const numbers = names.flatMap((name) => (/^[1-9]\d{0,8}\.jsonl$/.test(name) ? [Number.parseInt(name, 10)] : []));
  return numbers.sort((a, b) => a - b);
}

/** The first free number from `session` on: creating a file that must not exist is what makes it ours. */
async function claim(folder: string, session: number): Promise<{ session: number; file: FileHandle }> {
  for (let number = session; ; number += 1) {
    try {
      return { session: number, file: await open(fileOf(folder, number), "ax", 0o600) };
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== "EEXIST") throw error;
    }
  }
}

async function readSessions(folder: string, sessions: readonly number[]): Promise<Entry[]> {
  const read: Entry[][] = [];
  let bytes = 0;
  for (const session of sessions.toReversed()) {
    if (bytes > READ_BYTES) break;
    const text = await readFile(fileOf(folder, session), "utf8").catch(() => "");
    bytes += text.length;
    read.push(text.split("\n").flatMap((line) => entryOf(session, line)));
  }
  return read.toReversed().flat();
}

function entryOf(session: number, text: string): Entry[] {
  try {
    const [line, input] = JSON.parse(text) as [unknown, unknown];
    return Number.isSafeInteger(line) && typeof input === "string"
      ? [{ session, line: line as number, input, output: null }]
      : [];
  } catch {
    return []; // an empty line, or one that a full disk cut off
  }
}

/** Deletes the oldest sessions beyond the limit. */
async function forget(folder: string, sessions: readonly number[]): Promise<void> {
  const old = sessions.slice(0, Math.max(0, sessions.length - SESSIONS));
  for (const session of old) await rm(fileOf(folder, session), { force: true }).catch(() => {});
}
