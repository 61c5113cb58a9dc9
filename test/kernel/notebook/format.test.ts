import { spawnSync } from "node:child_process";
import { chmod, mkdtemp, readdir, readFile, rm, stat, symlink, writeFile } from "node:fs/promises";
import os from "node:os";
import path from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { readNotebook, writeAtomically, writeNotebook } from "../../../kernel/notebook/file.ts";
import { NotebookError } from "../../../kernel/notebook/format.ts";
import { parseNotebook } from "../../../kernel/notebook/parse.ts";
import { serialiseNotebook } from "../../../kernel/notebook/serialise.ts";

/** As the notebook server writes it: sorted keys, indent 1, line lists. */
const STORED = `{
 "cells": [
  {
   "cell_type": "markdown",
   "id": "intro",
   "metadata": {},
   "source": [
    "# A torus\\n",
    "with $\\\\tau = i$"
   ]
  },
  {
   "cell_type": "code",
   "execution_count": 2,
   "id": "one",
   "metadata": {
    "tags": [
     "keep"
    ]
   },
   "outputs": [
    {
     "name": "stdout",
     "output_type": "stream",
     "text": [
      "a\\n",
      "b"
     ]
    },
    {
     "data": {
      "application/vnd.halfperiod.value+json": {
       "lines": [
        "stay",
        "a list"
       ]
      },
      "image/png": "iVBORw0K\\n",
      "text/plain": [
       "1/2"
      ]
     },
     "execution_count": 2,
     "metadata": {},
     "output_type": "execute_result"
    }
   ],
   "source": [
    "1 / 2"
   ]
  }
 ],
 "metadata": {
  "kernelspec": {
   "display_name": "x",
   "language": "typescript",
   "name": "halfperiod"
  }
 },
 "nbformat": 4,
 "nbformat_minor": 5
}
`;

const minimal = (cell: object) => JSON.stringify({ nbformat: 4, nbformat_minor: 5, metadata: {}, cells: [cell] });
const code = { cell_type: "code", metadata: {}, source: "", outputs: [], execution_count: null };

describe("the text of a notebook", () => {
  it("reads and writes back the same bytes — oracle: a file as the notebook server writes it", () => {
    expect(serialiseNotebook(parseNotebook(STORED, "a.ipynb"))).toBe(STORED);
  });

  it("joins line lists and leaves JSON values unpacked", () => {
    const cell = parseNotebook(STORED, "a.ipynb").cells[1];
    expect(cell?.cell_type === "code" && cell.outputs[0]).toMatchObject({ text: "a\nb" });
    expect(cell?.cell_type === "code" && cell.outputs[1]).toMatchObject({
      data: { "text/plain": "1/2", "application/vnd.halfperiod.value+json": { lines: ["stay", "a list"] } },
    });
  });

  it.each([
    ["", "the file is empty"],
    [STORED.slice(0, 300), "the JSON breaks off after"],
    ["{\n  oops }", "not JSON (line 2, column 3)"],
    ["[]", "a list; expected a notebook"],
    ["{}", 'no "nbformat" number'],
    [JSON.stringify({ nbformat: 3, worksheets: [] }), "a notebook of format 3; expected format 4"],
    [JSON.stringify({ nbformat: 5 }), "a notebook of format 5"],
    [JSON.stringify({ nbformat: 4, nbformat_minor: 5, metadata: {} }), "notebook.cells is nothing"],
    [minimal({ ...code, source: 7 }), "cells[0].source is 7; expected text"],
    [minimal({ ...code, cell_type: "heading" }), 'cells[0].cell_type is "heading"'],
    [minimal({ ...code, outputs: [{ output_type: "pyout" }] }), 'cells[0].outputs[0].output_type is "pyout"'],
    [
      minimal({ ...code, outputs: [{ output_type: "display_data", metadata: {} }] }),
      "cells[0].outputs[0].data is nothing",
    ],
    [minimal({ ...code, execution_count: "x" }), "cells[0].execution_count"],
  ])("refuses %j and names what is wrong", (text, message) => {
    expect(() => parseNotebook(text, "a.ipynb")).toThrow(NotebookError);
    expect(() => parseNotebook(text, "a.ipynb")).toThrow(message);
  });

  it("refuses two cells of one id", () => {
    const twice = JSON.stringify({
      nbformat: 4,
      nbformat_minor: 5,
      metadata: {},
      cells: [
        { ...code, id: "a" },
        { ...code, id: "a" },
      ],
    });
    expect(() => parseNotebook(twice, "a.ipynb")).toThrow('two cells have the id "a"');
  });
});

describe("notebook files", () => {
  let folder: string;
  beforeEach(async () => {
    folder = await mkdtemp(path.join(os.tmpdir(), "halfperiod-file-"));
  });
  afterEach(() => rm(folder, { recursive: true, force: true }));

  it("says that a file is missing, or is a folder", async () => {
    await expect(readNotebook(path.join(folder, "none.ipynb"))).rejects.toThrow("none.ipynb: no such file");
    await expect(readNotebook(folder)).rejects.toThrow("is a folder");
  });

  it("replaces a file whole, keeps its permissions, follows a link, leaves nothing beside it", async () => {
    const file = path.join(folder, "a.ipynb");
    await writeFile(file, "old");
    await chmod(file, 0o640);
    await symlink(file, path.join(folder, "link.ipynb"));
    await writeNotebook(path.join(folder, "link.ipynb"), parseNotebook(STORED, file));
    expect(await readFile(file, "utf8")).toBe(STORED);
    expect((await stat(file)).mode & 0o777).toBe(0o640);
    expect((await readdir(folder)).sort()).toEqual(["a.ipynb", "link.ipynb"]);
  });

  it("refuses a path that cannot be written and keeps what is there", async () => {
    const file = path.join(folder, "a.ipynb");
    await writeFile(file, "old");
    await expect(writeAtomically(path.join(file, "b.ipynb"), "new")).rejects.toThrow("no such file");
    await expect(writeAtomically(folder, "new")).rejects.toThrow(NotebookError);
    expect(await readFile(file, "utf8")).toBe("old");
    expect(await readdir(folder)).toEqual(["a.ipynb"]);
  });

  it.skipIf(process.platform === "win32")(
    "keeps the old file when the disk refuses — oracle: file size limit",
    async () => {
      const file = path.join(folder, "a.ipynb");
      await writeFile(file, "old");
      const module = new URL("../../../dist/kernel/notebook/file.js", import.meta.url);
      const script = `import { writeAtomically } from ${JSON.stringify(module.href)};
      await writeAtomically(${JSON.stringify(file)}, "x".repeat(1e6)).catch((error) => process.stdout.write(error.message));`;
      const limited = `trap "" XFSZ; ulimit -f 64; exec "$0" --input-type=module -e "$1"`;
      const { stdout } = spawnSync("bash", ["-c", limited, process.execPath, script], { encoding: "utf8" });
      expect(stdout).toBe(`${file}: larger than files may be here`);
      expect(await readFile(file, "utf8")).toBe("old");
      expect(await readdir(folder)).toEqual(["a.ipynb"]);
    },
  );
});
