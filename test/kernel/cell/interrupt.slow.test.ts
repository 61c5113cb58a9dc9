// The long soak: 700 cells interrupted at random, 500 of them with an async hook of the user's.
import { expect, it } from "vitest";
import { TestNotebook } from "./notebook.ts";
import { soak } from "./soak.ts";

const SEED = Number(process.env.SOAK_SEED ?? 7);

it.each([
  [500, true],
  [200, false],
] as const)(
  "%i cells, async hook %s: every one ends as interrupted, the session survives",
  async (rounds, hook) => {
    const notebook = new TestNotebook();
    const times = await soak(notebook, { rounds, seed: SEED, hook });
    await notebook.session.shutdown();
    times.sort((a, b) => a - b);
    console.log(
      `median ${times[rounds >> 1]} ms, 95 % ${times[Math.floor(rounds * 0.95)]} ms, worst ${times.at(-1)} ms`,
    );
    expect(times.length).toBe(rounds);
  },
  1_200_000,
);
