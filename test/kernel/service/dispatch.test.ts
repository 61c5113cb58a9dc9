import { expect, it } from "vitest";
import { dispatch } from "../../../kernel/service/dispatch.ts";
import type { Answer } from "../../../kernel/service/service.ts";
import type { Message } from "../../../kernel/wire/message.ts";
import type { Wire } from "../../../kernel/wire/wire.ts";

const request = { identities: [], header: { msg_type: "execute_request" }, headerBytes: Buffer.from("{}") };

/** Serves one request on a wire whose iopub takes nothing before `take`; gives what happened, in order. */
function serving(answer: Answer) {
  const happened: string[] = [];
  let take: () => void = () => {};
  const published = new Promise<void>((resolve) => {
    take = resolve;
  });
  const wire = {
    published: () => published,
    send: (_: string, __: unknown, { type }: { type: string }) => happened.push(type),
  };
  const output = {
    publish: (type: string, { execution_state }: { execution_state?: string }) =>
      happened.push(execution_state ?? type),
    flush: () => happened.push("flush"),
  };
  const parts = { wire, output } as unknown as { wire: Wire; output: never };
  const done = dispatch("shell", request as unknown as Message, () => answer, parts);
  return { happened, take, done };
}
const turns = () => new Promise((resolve) => setImmediate(resolve));

it("the reply to a cell waits until its output is with the socket — oracle: protocol, order of one request", async () => {
  const { happened, take, done } = serving({ content: {}, afterOutput: true });
  await turns();
  expect(happened).toEqual(["busy", "flush"]);
  take();
  await done;
  expect(happened).toEqual(["busy", "flush", "execute_reply", "idle"]);
});

it("other replies do not wait for who reads slowly — oracle: a wire that takes nothing", async () => {
  const { happened, done } = serving({ content: {} });
  await done;
  expect(happened).toEqual(["busy", "flush", "execute_reply", "idle"]);
});
