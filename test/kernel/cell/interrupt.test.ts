// Interrupts: each way to hang once, the place shown, and a short soak. The long soak is in interrupt.slow.test.ts.
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { plain, TestNotebook } from "./notebook.ts";
import { HANGING, soak } from "./soak.ts";

let notebook: TestNotebook;
beforeAll(async () => {
  notebook = new TestNotebook();
  await notebook.value("let ticks = 0, finals = 0; let kept = 'kept'");
}, 60_000);
afterAll(() => notebook.session.shutdown());

async function interrupted(code: string, delay: number): Promise<string> {
  // The mark tells that the cell runs: on a busy machine its check may take longer than the delay.
  const running = notebook.run(`process.stdout.write("begun"); ${code}`);
  // A cell that fails before it begins has an outcome and no mark.
  await Promise.race([notebook.begun(), running]);
  setTimeout(() => notebook.session.interrupt(), delay);
  const outcome = await running;
  if (outcome.status !== "error") throw new Error("the cell ended by itself");
  expect(outcome.ename).toBe("Interrupted");
  return plain(outcome.traceback.join("\n"));
}

describe("interrupt", () => {
  it.each(HANGING)("%s: stopped, state kept", async (_name, code) => {
    await interrupted(code, 150);
    expect(await notebook.value("kept")).toBe('"kept"');
  });

  it("the place where it hung is shown", async () => {
    const trace = await interrupted("function stuck() {\n  for (;;) ticks++;\n}\nawait null;\nstuck();", 200);
    expect(trace).toContain(`stuck, in cell ${notebook.last}, line 2`);
    expect(trace).toContain("> 2 |   for (;;) ticks++;");
  });

  it("the place is shown in the synchronous part too", async () => {
    const trace = await interrupted("function busy() {\n  for (;;) ticks++;\n}\nbusy();", 200);
    expect(trace).toContain(`busy, in cell ${notebook.last}, line 2`);
  });

  it("finally runs when an await is interrupted", async () => {
    await notebook.value("finals = 0");
    await interrupted("try { await new Promise(() => {}) } finally { finals = 7 }", 100);
    expect(await notebook.value("finals")).toBe("7");
  });

  it("a long evaluation of the library stops, and its next value is right — oracle: a session that was never stopped", async () => {
    const setup = "const deep = lattice({ tau: 2*i }).wp(1/3)";
    await notebook.value(setup);
    await interrupted("deep.digits(10000)", 100);
    const fresh = new TestNotebook();
    await fresh.value(setup);
    for (const code of ["String(deep.digits(200))", "String(lattice({ tau: 2*i }).wp(1/5).digits(300))"]) {
      expect(await notebook.value(code)).toBe(await fresh.value(code));
    }
    await fresh.session.shutdown();
  });

  it("without a running cell it does nothing to the next", async () => {
    notebook.session.interrupt();
    expect(await notebook.value("await new Promise((r) => setTimeout(() => r(kept), 50))")).toBe('"kept"');
  });

  it("twice in a row is once", async () => {
    const running = notebook.run("process.stdout.write('begun'); for (;;) {}");
    await notebook.begun();
    notebook.session.interrupt();
    notebook.session.interrupt();
    expect(await running).toMatchObject({ status: "error", ename: "Interrupted" });
    expect(await notebook.value("kept")).toBe('"kept"');
  });

  it("a loop that an earlier cell left running does not block the session", async () => {
    await notebook.run("setTimeout(() => { for (;;) ticks++ }, 1)");
    // The cell cannot begin, so nothing tells when it waits for the child: a user would ask again.
    const asking = setInterval(() => notebook.session.interrupt(), 1000);
    expect(await notebook.run("1")).toMatchObject({ status: "error", ename: "Interrupted" });
    clearInterval(asking);
    expect(await notebook.value("kept")).toBe('"kept"');
  });
});

describe("soak", () => {
  it("100 cells interrupted at random with an async hook on: each ends as interrupted, with the state whole", async () => {
    const own = new TestNotebook();
    await soak(own, { rounds: 100, seed: 20261201, hook: true });
    await own.session.shutdown();
  }, 600_000);
});
