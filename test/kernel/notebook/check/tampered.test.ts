// A notebook that the real kernel ran, then changed in its stored values: what check says against a fresh run of it.
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { compareNotebooks } from "../../../../kernel/notebook/check/cells.ts";
import { executeFile } from "../../../../kernel/notebook/execute-file.ts";
import type { Notebook } from "../../../../kernel/notebook/format.ts";
import { serialiseNotebook } from "../../../../kernel/notebook/serialise.ts";
import { VALUE_TYPE } from "../../../../kernel/notebook/values.ts";
import { code, notebookOf } from "../cells.ts";

const SOURCES = [
  "provedDigits(50);\nconst E = curve`y^2 + y = x^3 - 4x`;\nconst L = E.lattice();\nL",
  "E.j",
  "figure.curve(E, { points: { P: E.point(0, 0), Q: E.point(-2, -1) } })",
  'claim("Legendre", L.quasiPeriods[0]*L.periods[1] - L.quasiPeriods[1]*L.periods[0], "=", 2*π*i)',
  "L.roots",
  "exp(1)",
];

const folder = mkdtempSync(path.join(os.tmpdir(), "halfperiod-tampered-"));
const screen = { write: () => true };
let fresh: Notebook;

beforeAll(async () => {
  const file = path.join(folder, "a.ipynb");
  writeFileSync(file, serialiseNotebook(notebookOf(...SOURCES.map((source) => code(source)))));
  fresh = (await executeFile(file, { screen })).notebook;
}, 120_000);
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** Verdicts after a change of the value of a cell's data, given by place (from 1). */
function verdictAfter(place: number, change: (data: never) => unknown) {
  const cells = fresh.cells.map((cell, index) => {
    if (index !== place - 1 || cell.cell_type !== "code") return cell;
    const outputs = cell.outputs.map((output) =>
      "data" in output && VALUE_TYPE in output.data
        ? {
            ...output,
            data: { ...output.data, [VALUE_TYPE]: change(structuredClone(output.data[VALUE_TYPE]) as never) },
          }
        : output,
    );
    return { ...cell, outputs };
  });
  const verdicts = compareNotebooks({ ...fresh, cells }, fresh);
  expect(verdicts.filter(({ position }) => position !== place).every(({ finding }) => finding === "same")).toBe(true);
  return verdicts[place - 1];
}

type Data = Record<string, never>;

describe("check against a fresh run", () => {
  it("finds nothing where nothing was changed", () => {
    expect(compareNotebooks(fresh, fresh).map(({ finding }) => finding)).toEqual(SOURCES.map(() => "same"));
  });

  it("one changed digit within the proved ones", () => {
    const changed = verdictAfter(6, (data: Data) => ({
      ...data,
      middle: String(data.middle).replace(/^(2718281828)4/, "$15"),
    }));
    expect(changed).toMatchObject({ finding: "differs", notes: [expect.stringContaining("was 2.7182818285")] });
  });

  it("a changed exact value", () => {
    expect(verdictAfter(2, (data: Data) => ({ ...data, value: "7077888/4068" }))).toMatchObject({ finding: "differs" });
  });

  it("a swapped basis, named as such", () => {
    const swapped = verdictAfter(1, (data: { periods: unknown[] }) => ({
      ...(data as object),
      periods: [...data.periods].reverse(),
    }));
    expect(swapped?.finding).toBe("differs");
    expect(swapped?.notes[0]).toContain("the same lattice in another basis, first = 0·ω1 + 1·ω2, second = 1·ω1 + 0·ω2");
  });

  it("roots in another order, named as such", () => {
    const turned = verdictAfter(5, (data: unknown[]) => [...data].reverse());
    expect(turned?.notes).toContain("value: the same values in another order");
  });

  it("a changed figure", () => {
    const moved = verdictAfter(3, (data: { points: Record<string, string> }) => ({
      ...data,
      points: { ...data.points, P: "(0, 1)" },
    }));
    expect(moved).toMatchObject({ finding: "differs", notes: [expect.stringContaining("points.P")] });
  });

  it("a claim that was stored with a better standing", () => {
    const better = verdictAfter(4, (data: Data) => ({ ...data, standing: { kind: "proved", argument: "exact" } }));
    expect(better).toMatchObject({
      finding: "weaker",
      notes: [expect.stringContaining('claim "Legendre": was proved')],
    });
  });

  it("an enclosure so wide that it can only overlap is weaker, not the same", () => {
    const cell = fresh.cells[5];
    const wide = { kind: "real", standing: "measured", middle: "2e0", radius: "1e0" };
    const worse = {
      ...fresh,
      cells: fresh.cells.map((one) =>
        one === cell && one.cell_type === "code"
          ? {
              ...one,
              outputs: one.outputs.map((o) => ("data" in o ? { ...o, data: { ...o.data, [VALUE_TYPE]: wide } } : o)),
            }
          : one,
      ),
    };
    expect(compareNotebooks(fresh, worse)[5]).toMatchObject({ finding: "weaker" });
  });

  it("a cell that fails now", () => {
    const failed = { output_type: "error" as const, ename: "E", evalue: "gone", traceback: [] };
    const broken = {
      ...fresh,
      cells: fresh.cells.map((one, k) => (k === 1 && one.cell_type === "code" ? { ...one, outputs: [failed] } : one)),
    };
    expect(compareNotebooks(fresh, broken)[1]).toMatchObject({ finding: "fails", notes: ["E: gone"] });
  });

  it.each([30, 80])("passes for the same notebook run with --digits %i", { timeout: 120_000 }, async (digits) => {
    const file = path.join(folder, "a.ipynb");
    const again = (await executeFile(file, { screen, digits })).notebook;
    expect(compareNotebooks(fresh, again, { digits }).map(({ finding }) => finding)).toEqual(SOURCES.map(() => "same"));
  });
});
