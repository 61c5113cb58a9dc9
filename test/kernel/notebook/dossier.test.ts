import { createHash } from "node:crypto";
import { readFileSync } from "node:fs";
import path from "node:path";
import { strFromU8, unzipSync } from "fflate";
import { describe, expect, it } from "vitest";
import { certificatesOf } from "../../../kernel/notebook/dossier/certificates.ts";
import { makeDossier } from "../../../kernel/notebook/dossier/dossier.ts";
import { parseNotebook } from "../../../kernel/notebook/parse.ts";
import { VALUE_TYPE } from "../../../kernel/notebook/values.ts";
import { packageRoot } from "../../../kernel/service/info.ts";
import { code, notebookOf, shown, text } from "./cells.ts";

const point = { kind: "point", curve: ["0", "0", "1", "-1", "0"], coordinates: ["0", "0"] };
const notebook = notebookOf(
  text("# A title"),
  code("const E = curve`y^2 + y = x^3 - x`;\nE.point(0, 0)", [
    shown({ "text/plain": "(0, 0)", "text/latex": "$(0,0)$", [VALUE_TYPE]: point }),
  ]),
  code("2 + 2", [shown({ "text/plain": "4", [VALUE_TYPE]: { kind: "rational", value: "4" } })]),
);
const options = { name: "n", folder: "." };

describe("the dossier", { timeout: 60_000 }, () => {
  const { bytes, files } = makeDossier(notebook, options);
  const inside = Object.fromEntries(
    Object.entries(unzipSync(bytes)).map(([name, content]) => [name.replace(/^n\//, ""), strFromU8(content)]),
  );

  it("holds notebook, page, paper, script, values, certificates, how to cite, licence — oracle: unzipped again", () => {
    expect(Object.keys(inside)).toEqual(files);
    expect(parseNotebook(inside["n.ipynb"] ?? "", "n").cells).toEqual(notebook.cells);
    expect(inside["n.html"]).toContain("<!doctype html>");
    expect(inside["n.tex"]).toContain("\\documentclass");
    expect(inside["n.ts"]).toContain("show(E.point(0, 0));");
    expect(JSON.parse(inside["values.json"] ?? "")).toMatchObject([
      { cell: 1, values: [{ text: "(0, 0)", data: point }] },
      { cell: 2, values: [{ text: "4", data: { value: "4" } }] },
    ]);
    expect(JSON.parse(inside["certificates.json"] ?? "")).toMatchObject([{ cell: 1, kind: "point", data: point }]);
    expect(inside["CITATION.txt"]).toContain('"A title". Notebook.');
    expect(inside["LICENSE.txt"]).toBe(readFileSync(path.join(packageRoot, "LICENSE"), "utf8"));
  });

  it("tells the digest of every file — oracle: SHA-256 of what is inside", () => {
    const { files: listed } = JSON.parse(inside["manifest.json"] ?? "") as {
      files: { file: string; sha256: string }[];
    };
    expect(listed.map(({ file }) => file)).toEqual(files.filter((file) => file !== "manifest.json"));
    for (const { file, sha256 } of listed)
      expect(
        createHash("sha256")
          .update(inside[file] ?? "")
          .digest("hex"),
      ).toBe(sha256);
  });

  it("is the same bytes again, also elsewhere in time", () => {
    expect(Buffer.from(makeDossier(notebook, options).bytes).equals(Buffer.from(bytes))).toBe(true);
  });

  it("goes without a script where a cell does not pass the check, and says so", () => {
    const { files: without, left } = makeDossier(notebookOf(code("const n: string = 1")), options);
    expect(without).not.toContain("n.ts");
    expect(left).toEqual([expect.stringContaining("code cell 1 does not pass the check")]);
  });
});

it("certificates are found inside tables, lists and records, with their place", () => {
  const map = { kind: "map", formula: ["x′ = x"], from: { kind: "curve" } };
  const value = {
    kind: "table",
    rows: [
      ["P", point],
      ["to", map],
    ],
    reduced: {
      matrix: [
        ["1", "0"],
        ["0", "1"],
      ],
    },
  };
  const found = certificatesOf(notebookOf(code("t", [shown({ [VALUE_TYPE]: value })])));
  expect(found.map(({ kind, at }) => [kind, at])).toEqual([
    ["point", "value 1.rows[0][1]"],
    ["map", "value 1.rows[1][1]"],
    ["matrix", "value 1.reduced.matrix"],
  ]);
});
