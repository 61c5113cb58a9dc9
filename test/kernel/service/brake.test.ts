import { expect, it } from "vitest";
import { createBrake } from "../../../kernel/service/brake.ts";

function outlet(pendingBytes: number) {
  let open: () => void = () => {};
  const done = new Promise<void>((resolve) => {
    open = resolve;
  });
  return { pendingBytes, published: () => done, open: () => open() };
}
const settled = async (promise: Promise<void> | undefined) => {
  let is = false;
  void promise?.then(() => {
    is = true;
  });
  await new Promise((resolve) => setImmediate(resolve));
  return is;
};

it("does not brake while little is on the way — oracle: the bytes", () => {
  expect(createBrake(outlet(1000)).wait()).toBeUndefined();
});

it("waits until what is on the way has gone — oracle: the outlet", async () => {
  const busy = outlet(1e9);
  const wait = createBrake(busy).wait();
  expect(await settled(wait)).toBe(false);
  busy.open();
  expect(await settled(wait)).toBe(true);
});

it("an interrupt frees every wait and the output after it for a while — oracle: the clock given here", async () => {
  let time = 1000;
  const brake = createBrake(outlet(1e9), () => time);
  const waits = [brake.wait(), brake.wait()];
  brake.release();
  expect(await Promise.all(waits.map(settled))).toEqual([true, true]);
  expect(brake.wait()).toBeUndefined();
  time += 5000;
  expect(brake.wait()).toBeUndefined();
  time += 60_000;
  expect(await settled(brake.wait())).toBe(false);
});
