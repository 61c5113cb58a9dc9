// A lane serves the requests of one channel one after the other, in the order of arrival.
import { log } from "../wire/log.ts";
import type { Message } from "../wire/message.ts";

export interface Lane {
  add(request: Message): void;
  /** Marks the requests of a type that wait now: they are answered without being carried out. */
  abort(type: string): void;
}

/** Serves with `serve`; `aborted` tells it that the request was marked. A fault in one does not hold up the next. */
export function createLane(serve: (request: Message, aborted: boolean) => Promise<void>): Lane {
  const waiting: { readonly request: Message; aborted: boolean }[] = [];
  let running = false;
  const run = async () => {
    running = true;
    for (let next = waiting.shift(); next; next = waiting.shift()) {
      await serve(next.request, next.aborted).catch((error) => log(`${next?.request.header.msg_type}: ${error}`));
    }
    running = false;
  };
  return {
    add(request) {
      waiting.push({ request, aborted: false });
      if (!running) void run();
    },
    abort(type) {
      for (const item of waiting) if (item.request.header.msg_type === type) item.aborted = true;
    },
  };
}
