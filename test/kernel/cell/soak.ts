// Cells that never end by themselves, and how a soak interrupts them at random and looks at the state after each.
import { expect } from "vitest";
import { plain, type TestNotebook } from "./notebook.ts";

/** Every way to hang: in the synchronous part, awaiting, after awaits, in callbacks, in promises, against catch-alls. */
export const HANGING: readonly (readonly [name: string, code: string])[] = [
  ["sync loop", "for (;;) { ticks++ }"],
  ["sync loop in a catch-all", "for (;;) { try { for (;;) ticks++ } catch {} finally { ticks++ } }"],
  ["never settled", "await new Promise(() => {})"],
  ["long sleep", "try { await new Promise((r) => setTimeout(r, 1e6)) } finally { finals++ }"],
  ["loop after an await", "await null; for (;;) { ticks++ }"],
  ["loop after a timer", "await new Promise((r) => setTimeout(r, 5)); for (;;) { ticks++ }"],
  ["loop in a timer", "setTimeout(() => { for (;;) ticks++ }, 2); await new Promise(() => {})"],
  ["loop in an immediate", "setImmediate(() => { for (;;) ticks++ }); await new Promise(() => {})"],
  [
    "microtask storm",
    "const storm = (): Promise<void> => Promise.resolve().then(() => { ticks++; return storm() }); await storm()",
  ],
  ["await storm", "const spin = async () => { for (;;) { await null; ticks++ } }; await spin()"],
  [
    "await loop against a catch-all",
    "for (;;) { try { await new Promise((r) => setTimeout(r, 1)) } catch {} ticks++ }",
  ],
  ["nested promises", "await Promise.all([1, 2, 3].map(async (n) => { await null; for (;;) ticks += n }))"],
  ["nextTick storm", "const tick = () => { ticks++; process.nextTick(tick) }; tick(); await new Promise(() => {})"],
  ["print loop", "for (;;) { console.log('line'); ticks++ }"],
  ["print loop after an await", "await null; for (;;) { console.log('line'); ticks++ }"],
  ["big products", "let big = 3n ** 20000n; for (;;) { big = (big * big) % (1n << 200000n); ticks++ }"],
  ["generator", "function* forever() { for (;;) yield ticks++ }; for (const _ of forever()) {}"],
  ["sort callback", "for (;;) { [3, 1, 2].sort((a, b) => { ticks++; return a - b }) }"],
  ["regular expression", "for (;;) { /^(a+)+$/.test('a'.repeat(24) + 'b'); ticks++ }"],
  [
    "for await",
    "async function* slow() { for (;;) { await new Promise((r) => setTimeout(r, 1)); yield 1 } }; for await (const _ of slow()) ticks++",
  ],
];

export interface SoakOptions {
  readonly rounds: number;
  readonly seed: number;
  /** An async hook of the user's is active. */
  readonly hook: boolean;
}

/** A small generator of equally distributed numbers in [0, 1) (Mulberry32), so that a seed repeats a run. */
export function random(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
}

/** Interrupts hanging cells at random times; after each the state must be whole and a cell must run. */
export async function soak(notebook: TestNotebook, { rounds, seed, hook }: SoakOptions): Promise<number[]> {
  const next = random(seed);
  const times: number[] = [];
  if (hook) {
    await notebook.value(
      "import { createHook } from 'node:async_hooks'; let hooks = 0; createHook({ init() { hooks++ }, before() { hooks++ } }).enable()",
    );
  }
  await notebook.value(
    "let ticks = 0, finals = 0, rounds = 0; const held = new Map([['a', [1, 2, 3]]]); const check = () => held.get('a')!.length + rounds",
  );
  for (let round = 1; round <= rounds; round++) {
    const [name, code] = HANGING[Math.floor(next() * HANGING.length)] as (typeof HANGING)[number];
    const delay = Math.floor(next() * next() * 80);
    let asked = 0;
    // The mark is printed when the cell begins: the delay is of its run, not of its check.
    const running = notebook.run(`process.stdout.write("begun"); ${code}`);
    await Promise.race([notebook.begun(), running]);
    setTimeout(() => {
      asked = Date.now();
      notebook.session.interrupt();
    }, delay);
    const outcome = await running;
    times.push(Date.now() - asked);
    const where = `round ${round}, ${name}, interrupted after ${delay} ms, seed ${seed}`;
    if (outcome.status !== "error" || outcome.ename !== "Interrupted") {
      expect.fail(`${where}: ${outcome.status === "error" ? plain(outcome.traceback.join("\n")) : "ended by itself"}`);
    }
    expect(await notebook.value("rounds++; ticks = 0; check()"), where).toBe(String(3 + round));
    notebook.events.length = 0;
  }
  return times;
}
