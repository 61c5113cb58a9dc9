// What was entered: the stored cells, and the questions that front ends ask about them.
import type { Json } from "../wire/message.ts";
import { flag, optionalNumber, optionalText } from "./fields.ts";

export interface Entry {
  readonly session: number;
  readonly line: number;
  readonly input: string;
  output: string | null;
}

export interface History {
  /** Number of this session. */
  readonly session: number;
  add(line: number, input: string): Entry;
  /** All entries, oldest first; of this session and those before. */
  entries(): readonly Entry[];
}

/** History of this process only. */
export function createHistory(earlier: readonly Entry[] = []): History {
  const session = (earlier.at(-1)?.session ?? 0) + 1;
  const all = [...earlier];
  return {
    session,
    add(line, input) {
      const entry: Entry = { session, line, input, output: null };
      all.push(entry);
      return entry;
    },
    entries: () => all,
  };
}

/**
 * Entries that a history_request asks for, oldest first, as the wire has them. Fields may be missing or null; an access
 * type that is not known finds nothing.
 */
export function answerHistory(request: Json, history: History): readonly (readonly unknown[])[] {
  const withOutput = flag(request, "output", false);
  return select(request, history).map(({ session, line, input, output }) =>
    withOutput ? [session, line, [input, output]] : [session, line, input],
  );
}

function select(request: Json, history: History): readonly Entry[] {
  const last = (entries: readonly Entry[]) => {
    const n = optionalNumber(request, "n");
    if (n === undefined) return entries;
    return n >= 1 ? entries.slice(-Math.floor(n)) : [];
  };
  switch (optionalText(request, "hist_access_type")) {
    case "tail":
      return last(unique(request, history.entries()));
    case "search":
      return last(unique(request, search(request, history.entries())));
    case "range":
      return range(request, history);
    default:
      return [];
  }
}

function search(request: Json, entries: readonly Entry[]): readonly Entry[] {
  const matches = globMatcher(optionalText(request, "pattern") ?? "*");
  return entries.filter((entry) => matches(entry.input));
}

function unique(request: Json, entries: readonly Entry[]): readonly Entry[] {
  if (!flag(request, "unique", false)) return entries;
  const latest = new Map(entries.map((entry) => [entry.input, entry]));
  return entries.filter((entry) => latest.get(entry.input) === entry);
}

// session 0 is this one, a negative number counts back from it; start counts from the end if negative; stop exclusive.
function range(request: Json, history: History): readonly Entry[] {
  const wanted = optionalNumber(request, "session") ?? 0;
  const session = wanted > 0 ? wanted : history.session + wanted;
  const entries = history.entries().filter((entry) => entry.session === session);
  const lines = (entries.at(-1)?.line ?? 0) + 1;
  const fromEnd = (line: number) => (line < 0 ? lines + line : line);
  const start = fromEnd(optionalNumber(request, "start") ?? 1);
  const stop = fromEnd(optionalNumber(request, "stop") ?? lines);
  return entries.filter((entry) => entry.line >= start && entry.line < stop);
}

/**
 * Matcher of a glob over the whole text: * is any run of characters, ? one. Two pointers and one step back to the last
 * star: no pattern makes it exponential.
 */
export function globMatcher(pattern: string): (text: string) => boolean {
  const glob = [...pattern];
  return (source) => {
    const text = [...source];
    let at = 0;
    let here = 0;
    let star = -1;
    let mark = 0;
    while (here < text.length) {
      if (glob[at] === "*") {
        star = at++;
        mark = here;
      } else if (at < glob.length && (glob[at] === "?" || glob[at] === text[here])) {
        at += 1;
        here += 1;
      } else if (star >= 0) {
        at = star + 1;
        here = ++mark;
      } else return false;
    }
    while (glob[at] === "*") at += 1;
    return at === glob.length;
  };
}
