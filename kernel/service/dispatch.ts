// Around every request: busy first, its reply, idle last, whatever happens in between.
import { ProtocolError } from "../wire/errors.ts";
import { log } from "../wire/log.ts";
import type { Json, Message } from "../wire/message.ts";
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
  const type = replyType(request.header.msg_type);
  const reply = async ({ content, metadata = {}, copied, afterOutput }: Answer) => {
    output.flush(); // what the cell printed goes out before its reply
    if (afterOutput) await wire.published();
    wire.send(channel, request.identities, { type, content, metadata, parent: request });
    if (copied) output.publish(type, content, request);
  };
  output.publish("status", { execution_state: "busy" }, request);
  let answer: Answer | undefined;
  try {
    answer = await answering();
    if (answer) await reply(answer);
  } catch (error) {
    if (!(error instanceof ProtocolError)) log(`${request.header.msg_type}: ${error}`); // else the client's own fault
    if (type.endsWith("_reply")) await reply({ content: { ...failure(error), ...counterOf(answer) } });
  }
  output.publish("status", { execution_state: "idle" }, request);
  answer?.afterIdle?.();
}

// The reply to an execute request has the counter whatever becomes of it.
function counterOf(answer: Answer | undefined): Json {
  const count = answer?.content.execution_count;
  return count === undefined ? {} : { execution_count: count };
}

function replyType(type: string): string {
  return type.replace(/_request$/, "_reply");
}
