// What goes out on iopub: one ordered queue. Text of a cell is gathered into few messages, of updates to one display only
// the latest goes out; everything else passes in order, so a stream never overtakes a result nor a result a stream.
import type { Json, Outgoing, Parent } from "../wire/message.ts";

export type StreamName = "stdout" | "stderr";
type Cause = Pick<Parent, "headerBytes">;

/** How long text may wait for more, in ms: quick enough to watch, slow enough for hosts that count messages. */
const GATHER = 40;
/** Text gathered up to here goes out at once; no message carries more. In UTF-16 units. */
const FULL = 250_000;

export interface Output {
  /** Publishes, after what was gathered so far. */
  publish(type: string, content: Json, parent: Cause | undefined): void;
  /** Takes text for stdout or stderr of what `parent` started. */
  stream(name: StreamName, text: string, parent: Cause): void;
  /** Takes the new content of a display; a later one for the same display may replace it before it goes out. */
  update(displayId: string, content: Json, parent: Cause): void;
  /** Sends what was gathered so far. */
  flush(): void;
}

/** What waits for more of its kind: text of one stream, or the content of one display. */
type Waiting =
  | { readonly kind: "stream"; readonly key: StreamName; readonly parent: Cause; text: string }
  | { readonly kind: "update"; readonly key: string; readonly parent: Cause; content: Json };

/** Output on top of a publishing function. */
export function createOutput(publish: (outgoing: Outgoing, topic?: string) => void): Output {
  let waiting: Waiting | undefined;
  let timer: NodeJS.Timeout | undefined;

  const sendText = (text: string, name: StreamName, parent: Cause) => {
    for (const piece of pieces(text)) {
      publish({ type: "stream", content: { name, text: piece }, parent }, `stream.${name}`);
    }
  };
  const flush = () => {
    clearTimeout(timer);
    timer = undefined;
    const last = waiting;
    waiting = undefined;
    if (last?.kind === "stream") sendText(last.text, last.key, last.parent);
    else if (last) publish({ type: "update_display_data", content: last.content, parent: last.parent });
  };
  // Keeps a first half of a surrogate pair back: its second half may come with the next write.
  const sendGathered = () => {
    timer = undefined;
    if (waiting?.kind !== "stream" || !endsInsidePair(waiting.text)) return flush();
    const { text, key, parent } = waiting;
    waiting.text = text.slice(-1);
    sendText(text.slice(0, -1), key, parent);
  };
  const startTimer = () => {
    timer ??= setTimeout(sendGathered, GATHER);
  };
  const continues = (kind: Waiting["kind"], key: string, parent: Cause) =>
    waiting?.kind === kind && waiting.key === key && waiting.parent === parent;

  return {
    publish(type, content, parent) {
      flush();
      publish({ type, content, parent });
    },
    stream(name, text, parent) {
      if (text === "") return;
      if (!continues("stream", name, parent)) flush();
      waiting = { kind: "stream", key: name, parent, text: (waiting?.kind === "stream" ? waiting.text : "") + text };
      if (waiting.text.length >= FULL) sendGathered();
      else startTimer();
    },
    update(displayId, content, parent) {
      if (!continues("update", displayId, parent)) flush();
      waiting = { kind: "update", key: displayId, parent, content };
      startTimer();
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
