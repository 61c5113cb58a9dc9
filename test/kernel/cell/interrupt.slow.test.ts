// The long soak: 600 cells interrupted at random, with and without an async hook of the user's.
import { expect, it } from "vitest";
import { TestNotebook } from "./notebook.ts";
import { soak } from "./soak.ts";

const SEED = Number(process.env.SOAK_SEED ?? 7);

it.each([true, false])(
  "300 cells, async hook %s: every one ends as interrupted, the session survives",
  async (hook) => {
    const notebook = new TestNotebook();
    const times = await soak(notebook, { rounds: 300, seed: SEED, hook });
    await notebook.session.shutdown();
    times.sort((a, b) => a - b);
    console.log(`median ${times[150]} ms, 95 % ${times[285]} ms, worst ${times[299]} ms`);
    expect(times.length).toBe(300);
  },
  600_000,
);
