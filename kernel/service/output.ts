// What goes out on iopub: one ordered queue. Text of a cell is gathered into few messages, everything else passes it in
// order, so a stream never overtakes a result nor a result a stream.
import type { Json, Outgoing, Parent } from "../wire/message.ts";

export type StreamName = "stdout" | "stderr";
type Cause = Pick<Parent, "headerBytes">;

/** How long text may wait for more, in ms: quick enough to watch, slow enough for hosts that count messages. */
const GATHER = 40;
/** Text gathered up to here goes out at once; no message carries more. In UTF-16 units. */
const FULL = 100_000;

export interface Output {
  /** Publishes, after the text gathered so far. */
  publish(type: string, content: Json, parent: Cause | undefined, topic?: string): void;
  /** Takes text for stdout or stderr of what `parent` started. */
  stream(name: StreamName, text: string, parent: Cause): void;
  /** Sends the text gathered so far. */
  flush(): void;
}

interface Run {
  readonly name: StreamName;
  readonly parent: Cause;
  text: string;
}

/** Output on top of a publishing function. */
export function createOutput(publish: (outgoing: Outgoing, topic?: string) => void): Output {
  let run: Run | undefined;
  let timer: NodeJS.Timeout | undefined;

  const emit = (text: string, { name, parent }: Run) =>
    publish({ type: "stream", content: { name, text }, parent }, `stream.${name}`);

  // Keeps a first half of a surrogate pair back: its second half may come with the next write.
  const sendWhole = () => {
    if (!run) return;
    const keep = endsInsidePair(run.text) ? 1 : 0;
    const ready = run.text.slice(0, run.text.length - keep);
    run.text = run.text.slice(ready.length);
    for (const piece of pieces(ready)) emit(piece, run);
  };
  const flush = () => {
    clearTimeout(timer);
    timer = undefined;
    if (!run) return;
    for (const piece of pieces(run.text)) emit(piece, run);
    run = undefined;
  };
  const onTime = () => {
    timer = undefined;
    sendWhole();
  };

  return {
    publish(type, content, parent, topic) {
      flush();
      publish({ type, content, parent }, topic ?? type);
    },
    stream(name, text, parent) {
      if (text === "") return;
      if (run && (run.name !== name || run.parent !== parent)) flush();
      run ??= { name, parent, text: "" };
      run.text += text;
      if (run.text.length >= FULL) sendWhole();
      else timer ??= setTimeout(onTime, GATHER);
    },
    flush,
  };
}

function* pieces(text: string): Generator<string> {
  for (let at = 0; at < text.length; ) {
    const end = at + FULL;
    const cut = end < text.length && endsInsidePair(text.slice(at, end)) ? end - 1 : end;
    yield text.slice(at, cut);
    at = cut;
  }
}

function endsInsidePair(text: string): boolean {
  const last = text.charCodeAt(text.length - 1);
  return last >= 0xd800 && last <= 0xdbff;
}
