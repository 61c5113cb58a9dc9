import path from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type HostPlace, makePlace, missing, PYTHON, root, run } from "./hosts.ts";

const absent = missing({ module: "jupyter_client", debianPackage: "python3-jupyter-client" });
if (absent) console.warn(`skipped, ${absent}`);

// biome-ignore lint/suspicious/noExplicitAny: facts of many shapes, each asserted below
type Facts = Record<string, any>;

describe.skipIf(absent !== "")("Python's jupyter_client", () => {
  let place: HostPlace;
  let facts: Facts;
  beforeAll(async () => {
    place = makePlace();
    const script = path.join(root, "test/hosts/jupyter_client_session.py");
    facts = JSON.parse(await run(PYTHON, [script], place.env)) as Facts;
    if (facts.timed_out) console.error(JSON.stringify(facts, undefined, 1));
  });
  afterAll(() => place?.remove());

  it("was answered in time, every time", () => expect(facts.timed_out).toBeUndefined());

  it("learns who the kernel is", () => {
    expect(facts.info).toMatchObject({
      status: "ok",
      protocol_version: "5.5",
      implementation: "halfperiod",
      language_info: { name: "typescript", file_extension: ".ts", mimetype: "text/typescript" },
    });
  });

  it("executes a cell: busy first, idle last, one result", () => {
    expect(facts.plain.order).toEqual(["status", "execute_input", "execute_result", "status"]);
    expect(facts.plain.states).toEqual(["busy", "idle"]);
    expect(facts.plain.data["text/plain"]).toBe("2");
    expect(facts.plain.reply).toMatchObject({ status: "ok", execution_count: 1, user_expressions: {} });
    expect(facts.stream.text).toContain("a");
    expect(facts.stream.text).toMatch(/a\s+b\s+c/);
  });

  it("gets rich results: LaTeX for a curve, SVG for a figure, each with plain text", () => {
    expect(facts.rich.data["text/latex"]).toMatch(/^\$[\s\S]*\$$/);
    expect(facts.rich.data["text/plain"]).toContain("x^3");
    expect(facts.picture.data["image/svg+xml"]).toMatch(/^<svg[\s\S]*<\/svg>$/);
    expect(typeof facts.picture.data["text/plain"]).toBe("string");
  });

  it("gets errors: of types before anything runs, thrown ones with the user's line", () => {
    expect(facts.type_error.error.ename).toBe("TypeScriptError");
    expect(facts.type_error.error.evalue).toContain("TS2322");
    expect(facts.thrown.error).toMatchObject({ ename: "RangeError", evalue: "deliberate" });
    expect(facts.thrown.error.traceback.join("\n")).toMatch(/line 2/);
    expect(facts.thrown.reply).toMatchObject({ status: "error", ename: "RangeError" });
    expect(facts.after_error.data["text/plain"]).toBe("42");
  });

  it.each(["interrupt_loop", "interrupt_wait", "interrupt_timer"])("stops endless code, state kept: %s", (name) => {
    expect(facts[name].reply.status).toBe("error");
    expect(facts[name].order.filter((kind: string) => kind === "error")).toHaveLength(1);
    expect(facts.after_interrupt.data["text/plain"]).toBe("41");
  });

  it("completes behind an emoji, in code points", () => {
    expect(facts.completion.status).toBe("ok");
    expect(facts.completion.matches).toContain("lattice");
    expect(facts.completion.cursor_start).toBe(facts.completion_start);
    expect(facts.completion.cursor_end).toBe(facts.completion_start + 4);
  });

  it("restarts: a new process, nothing of the old state, counts from 1", () => {
    expect(facts.restart_new_process).toBe(true);
    expect(facts.after_restart.reply.status).toBe("error");
    expect(facts.count_after_restart).toBe(2);
  });

  it("shuts down by itself and leaves no process", () => {
    expect(facts.family_size).toBeGreaterThan(1);
    expect(facts.shutdown_status).toBe(0);
    expect(facts.all_gone).toBe(true);
  });
});
