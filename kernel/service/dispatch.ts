// Around every request: busy first, its reply, idle last, whatever happens in between.
import { log } from "../wire/log.ts";
import type { Message } from "../wire/message.ts";
import type { RequestChannel, Wire } from "../wire/wire.ts";
import type { Output } from "./output.ts";
import { type Answer, failure } from "./service.ts";

/** Gives the answer of a request, which may be none. */
export type Answering = () => Answer | undefined | Promise<Answer | undefined>;

/** Serves one request of a channel. Never rejects. */
export async function dispatch(
  channel: RequestChannel,
  request: Message,
  answering: Answering,
  { wire, output }: { readonly wire: Wire; readonly output: Output },
): Promise<void> {
  const { identities } = request;
  output.publish("status", { execution_state: "busy" }, request);
  const answer = await settle(request.header.msg_type, answering);
  if (answer) {
    const { content, metadata = {} } = answer;
    const type = replyType(request.header.msg_type);
    output.flush(); // what the cell printed goes out before its reply
    wire.send(channel, identities, { type, content, metadata, parent: request });
    if (answer.copied) output.publish(type, content, request);
  }
  output.publish("status", { execution_state: "idle" }, request);
  answer?.afterIdle?.();
}

async function settle(type: string, answering: Answering): Promise<Answer | undefined> {
  try {
    return await answering();
  } catch (error) {
    if (!type.endsWith("_request")) log(`${type}: ${error}`);
    return type.endsWith("_request") ? { content: { ...failure(error) } } : undefined;
  }
}

function replyType(type: string): string {
  return type.replace(/_request$/, "_reply");
}
