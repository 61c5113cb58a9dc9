import { mkdtempSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type HostPlace, makePlace, missing, root, run } from "../hosts.ts";
import { NOTEBOOK_PROGRAM, type NotebookServer, startNotebookServer } from "../notebook-server.ts";

const absent = missing({ program: NOTEBOOK_PROGRAM, debianPackage: "jupyter-notebook" });
if (absent) console.warn(`skipped, ${absent}`);

describe.skipIf(absent !== "")("the published JavaScript client, through a notebook server", () => {
  let place: HostPlace;
  let server: NotebookServer;
  // biome-ignore lint/suspicious/noExplicitAny: facts of many shapes, each asserted below
  let facts: Record<string, any>;
  beforeAll(async () => {
    place = makePlace();
    server = await startNotebookServer(place, mkdtempSync(path.join(tmpdir(), "halfperiod lab ")));
    const address = new URL(server.url(""));
    const token = address.searchParams.get("token") ?? "";
    const script = path.join(root, "test/hosts/protocol/lab-client.mjs");
    const printed = await run(process.execPath, [script, `${address.origin}/`, token], place.env);
    facts = JSON.parse(printed.split("\n").at(-1) ?? "");
  }, 300_000);
  afterAll(async () => {
    await server?.stop();
    place?.remove();
  });

  it("finds every message valid — oracle: the client's own check of the protocol's fields", () => {
    expect(facts.messages).toBeGreaterThan(40);
    expect(facts.invalid).toEqual([]);
  });

  it("gets the kernelspec with its three logos — oracle: the server's listing", () => {
    expect(Object.keys(facts.spec.resources).sort()).toEqual(["logo-32x32", "logo-64x64", "logo-svg"]);
    expect(facts.spec.language).toBe(facts.info.language_info.name);
  });

  it("gets results, errors, rich bundles and answers a question — oracle: what the cells do", () => {
    expect(facts.plain.reply.status).toBe("ok");
    expect(facts.plain.outputs.map(([type]: [string]) => type)).toEqual(["execute_input", "stream", "execute_result"]);
    expect(facts.failed.reply).toMatchObject({ status: "error", ename: "RangeError", evalue: "deliberate" });
    expect(Object.keys(facts.rich.outputs.at(-1)[1].data)).toEqual(
      expect.arrayContaining(["text/plain", "text/latex"]),
    );
    expect(facts.asked.outputs.at(-1)[1].data["text/plain"]).toContain("7");
  });

  it("completes, inspects, asks whether code is whole, reads the history — oracle: counted by hand", () => {
    expect(facts.completion).toMatchObject({ status: "ok", cursor_start: 10, cursor_end: 13 });
    expect(facts.completion.matches).toContain("hypot");
    expect(facts.inspection.found).toBe(true);
    expect(facts.complete).toMatchObject({ status: "incomplete", indent: expect.any(String) });
    expect(facts.history.history.length).toBe(2);
    expect(facts.comms).toEqual({ status: "ok", comms: {} });
  });

  it("interrupts, restarts and shuts down; nothing is left running — oracle: the server's listing", () => {
    expect(facts.interrupted.status).toBe("error");
    expect(facts.status).toBe("idle");
    expect(facts.restarted.reply).toMatchObject({ status: "error", execution_count: 1 });
    expect(facts.left).toBe(0);
  });
});
