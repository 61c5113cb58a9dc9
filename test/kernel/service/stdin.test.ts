import { afterAll, beforeAll, expect, it } from "vitest";
import { summary } from "../client.ts";
import { startTestKernel, type TestKernel } from "./harness.ts";

let test: TestKernel;
beforeAll(async () => {
  test = await startTestKernel();
});
afterAll(() => test.stop());

async function asking(code = "print before\nask x?", options: object = { allow_stdin: true }) {
  const { client } = test;
  const count = client.questions.length;
  const id = await client.send("shell", "execute_request", { code, ...options });
  const question = await client.until(() => client.questions[count]);
  return { id, question };
}
const result = async (id: string) => (await test.client.exchange(id)).published.at(-2)?.content.data?.["text/plain"];

it("asks the client of the cell, after its text, and takes the answer — oracle: protocol, stdin", async () => {
  const { id, question } = await asking();
  expect(question.header.msg_type).toBe("input_request");
  expect(question.content).toEqual({ prompt: "x?", password: false });
  expect(question.parent.msg_id).toBe(id);
  await test.client.send("stdin", "input_reply", { value: "é 7" }, question.header);
  expect(await result(id)).toBe("é 7");
  expect(summary(test.client.of(id))).toEqual(["busy", "execute_input", "stream", "execute_result", "idle"]);
});

it("an older client's answer without a parent counts; a value of the wrong type is empty — oracle: protocol", async () => {
  for (const [value, read] of [
    ["a", "a"],
    [5, ""],
  ]) {
    const { id } = await asking();
    await test.client.send("stdin", "input_reply", { value });
    expect(await result(id)).toBe(read);
  }
});

it("end of file arrives as such — oracle: protocol, U+0004", async () => {
  const { id } = await asking();
  await test.client.send("stdin", "input_reply", { value: "\u0004" });
  expect(await result(id)).toBe("null");
});

it("without allow_stdin nobody is asked and the cell goes on — oracle: protocol", async () => {
  const questions = test.client.questions.length;
  for (const options of [{ allow_stdin: false }, {}, { allow_stdin: null }]) {
    const { reply } = await test.client.execute("ask x?", options);
    expect(reply.content.status).toBe("ok");
  }
  expect(test.client.questions.length).toBe(questions);
});

it("answers of another client, stale ones and forged ones do not count — oracle: protocol", async () => {
  const other = await test.another();
  await test.taken("stdin", 1, () => test.client.send("stdin", "input_reply", { value: "too early" }));
  const first = await asking();
  await test.client.request("control", "interrupt_request");
  await test.client.exchange(first.id);
  const second = await asking();
  await other.send("stdin", "input_reply", { value: "of another" }, second.question.header);
  await test.client.send("stdin", "input_reply", { value: "stale" }, first.question.header);
  const forged = test.client.frames(test.client.header("input_reply"), { value: "forged" }, { key: "wrong" });
  await test.client.stdin.send(forged);
  await test.client.send("stdin", "input_reply", { value: "right" }, second.question.header);
  expect(await result(second.id)).toBe("right");
});

it("an interrupt ends the wait, and the next question works — oracle: protocol", async () => {
  const { id } = await asking();
  await test.client.request("control", "interrupt_request");
  expect((await test.client.exchange(id)).reply.content.status).toBe("error");
  const next = await asking();
  await test.client.send("stdin", "input_reply", { value: "2" });
  expect(await result(next.id)).toBe("2");
});
