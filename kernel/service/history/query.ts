// The questions that front ends ask about what was entered.
import type { Json } from "../../wire/message.ts";
import { flag, optionalNumber, optionalText } from "../fields.ts";
import { globMatcher } from "./glob.ts";
import type { Entry, History } from "./store.ts";

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
