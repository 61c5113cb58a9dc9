import { afterEach, beforeEach, expect, it, vi } from "vitest";
import { createOutput, type Output } from "../../../kernel/service/output.ts";
import type { Outgoing } from "../../../kernel/wire/message.ts";

const A = { headerBytes: Buffer.from("a") };
const B = { headerBytes: Buffer.from("b") };
let sent: Outgoing[];
let output: Output;

beforeEach(() => {
  vi.useFakeTimers();
  sent = [];
  output = createOutput((outgoing) => void sent.push(outgoing));
});
afterEach(() => vi.useRealTimers());

const text = () => sent.map(({ content }) => content.text);

it("gathers small writes into one message within 100 ms — oracle: the clock", () => {
  for (const part of ["a", "b", "c"]) output.stream("stdout", part, A);
  expect(sent).toEqual([]);
  vi.advanceTimersByTime(100);
  expect(sent).toEqual([{ type: "stream", content: { name: "stdout", text: "abc" }, parent: A }]);
  output.stream("stdout", "d", A);
  vi.advanceTimersByTime(100);
  expect(text()).toEqual(["abc", "d"]);
});

it("keeps the order between stdout, stderr and cells — oracle: the order of the writes", () => {
  output.stream("stdout", "1", A);
  output.stream("stderr", "2", A);
  output.stream("stdout", "3", A);
  output.stream("stdout", "4", B);
  output.publish("execute_result", {}, B);
  expect(sent.map(({ type, content, parent }) => [type, content.text, parent])).toEqual([
    ["stream", "1", A],
    ["stream", "2", A],
    ["stream", "3", A],
    ["stream", "4", B],
    ["execute_result", undefined, B],
  ]);
});

it("does not split a surrogate pair, and loses no half — oracle: the text put in", () => {
  output.stream("stdout", "x\ud83d", A);
  vi.advanceTimersByTime(100);
  output.stream("stdout", "\ude00y", A);
  vi.advanceTimersByTime(100);
  expect(text()).toEqual(["x", "😀y"]);
  output.stream("stdout", "\ud83d", A);
  output.flush();
  expect(text()).toEqual(["x", "😀y", "\ud83d"]);
});

it("sends 10 MB in tens of messages, whole, without waiting — oracle: the text put in", () => {
  const line = "0123456789😀abcdef\n";
  const whole = line.repeat(560_000);
  output.stream("stdout", whole, A);
  output.flush();
  expect(text().join("")).toBe(whole);
  expect(sent.length).toBeLessThan(60);
  for (const piece of text()) expect(Buffer.from(String(piece)).toString()).toBe(piece);
});

it("ten thousand writes of a line are few messages — oracle: the size", () => {
  for (let i = 0; i < 10_000; i += 1) output.stream("stdout", `${i}${"-".repeat(100)}\n`, A);
  output.flush();
  expect(text().join("").length).toBe(10_000 * 101 + 38_890);
  expect(sent.length).toBeLessThan(15);
});

it("of updates to one display the latest goes out, in its place among the text — oracle: the order of the writes", () => {
  for (let n = 1; n <= 1000; n += 1) output.update("d", { n }, A);
  output.stream("stdout", "after", A);
  output.update("d", { n: 1001 }, A);
  output.update("e", { n: 1002 }, A);
  output.update("e", { n: 1003 }, B);
  vi.advanceTimersByTime(100);
  expect(sent.map(({ type, content }) => content.text ?? [type, content.n])).toEqual([
    ["update_display_data", 1000],
    "after",
    ["update_display_data", 1001],
    ["update_display_data", 1002],
    ["update_display_data", 1003],
  ]);
});
