// A cell as its user meets it in the classic notebook: completion, tooltip, a type error, an interrupt. The pictures are
// kept to be looked at.
import { copyFileSync } from "node:fs";
import path from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openBrowser } from "./chromium.ts";
import { failingNotebooks } from "./demo.ts";
import { artefacts, CHROMIUM, type HostPlace, makePlace, missing } from "./hosts.ts";
import { NOTEBOOK_PROGRAM, type NotebookServer, startNotebookServer } from "./notebook-server.ts";

const absent = missing(
  { program: NOTEBOOK_PROGRAM, debianPackage: "jupyter-notebook" },
  { program: CHROMIUM, debianPackage: "chromium" },
);

const READY =
  "window.Jupyter && Jupyter.notebook && Jupyter.notebook.kernel && Jupyter.notebook.kernel.is_connected() && Jupyter.notebook._fully_loaded";

describe.skipIf(absent !== "")("a cell in the classic notebook", () => {
  let place: HostPlace;
  let server: NotebookServer;
  let browser: Browser;
  let page: Page;
  beforeAll(async () => {
    place = makePlace();
    const [file] = failingNotebooks as [string];
    copyFileSync(file, path.join(place.folder, "cells.ipynb"));
    server = await startNotebookServer(place, place.folder);
    browser = await openBrowser();
    page = await browser.newPage({ viewport: { width: 1000, height: 700 } });
    page.setDefaultTimeout(60_000);
    await page.goto(server.url("notebooks/cells.ipynb"));
    await page.waitForFunction(READY);
    // An empty page to type into: one cell above all.
    await page.evaluate("Jupyter.notebook.clear_all_output(); Jupyter.notebook.insert_cell_above('code', 0)");
    await run("const E = curve`y^2 + y = x^3 - x`; const L = E.lattice(); E");
  });
  afterAll(async () => {
    await browser?.close();
    await server?.stop();
    place?.remove();
  });

  const photograph = (name: string) => page.screenshot({ path: path.join(artefacts, `classic-cell-${name}.png`) });

  /** Puts text into the first cell and the cursor behind it. */
  async function type(code: string): Promise<void> {
    await page.evaluate(`(() => {
      const cell = Jupyter.notebook.get_cell(0);
      cell.set_text(${JSON.stringify(code)});
      Jupyter.notebook.select(0);
      Jupyter.notebook.edit_mode();
      cell.code_mirror.focus();
      cell.code_mirror.setCursor(cell.code_mirror.lineCount(), 0);
      cell.code_mirror.execCommand("goDocEnd");
    })()`);
  }

  async function start(code: string): Promise<void> {
    await type(code);
    await page.evaluate("Jupyter.notebook.get_cell(0).execute()");
  }

  async function run(code: string): Promise<string> {
    await start(code);
    await page.waitForFunction("Number.isInteger(Jupyter.notebook.get_cell(0).input_prompt_number)");
    return page.evaluate("Jupyter.notebook.get_cell(0).output_area.element.text()") as Promise<string>;
  }

  it("offers the members of a library value — oracle: the names of the documentation", async () => {
    await type("L.ta");
    await page.keyboard.press("Tab");
    await page.waitForFunction(
      "document.querySelector('#complete') || /L\\.tau$/.test(Jupyter.notebook.get_cell(0).get_text())",
    );
    await page.keyboard.press("Escape");
    await type("E.");
    await page.keyboard.press("Tab");
    await page.waitForSelector("#complete");
    const offered = (await page.evaluate("document.querySelector('#complete').textContent")) as string;
    await photograph("completion");
    for (const name of ["discriminant", "lattice", "minimal", "point", "torsion"]) expect(offered).toContain(name);
    await page.keyboard.press("Escape");
  });

  it("turns a LaTeX name into its letter", async () => {
    await type("\\omega");
    await page.keyboard.press("Tab");
    await page.waitForFunction(
      "Jupyter.notebook.get_cell(0).get_text() === 'ω' || document.querySelector('#complete')",
    );
    await photograph("letter");
    await page.keyboard.press("Escape");
  });

  it("explains a function in the tooltip — oracle: its docstring", async () => {
    await type("L.wp(");
    await page.keyboard.press("Shift+Tab");
    await page.waitForFunction(
      "document.querySelector('#tooltip') && document.querySelector('#tooltip').offsetHeight > 20",
    );
    await page.waitForFunction("document.querySelector('#tooltip').textContent.length > 20");
    await photograph("tooltip");
    const shown = (await page.evaluate("document.querySelector('#tooltip').textContent")) as string;
    expect(shown).toMatch(/wp|℘/);
    await page.keyboard.press("Escape");
  });

  it("shows a type error at its place", async () => {
    const shown = await run("const n: number = 1;\nE.point(0, 0) * 0.5");
    await photograph("type-error");
    expect(shown).toContain("A point has whole multiples");
    expect(shown).toContain("line 2, column 15");
  });

  it("stops an endless cell at the button, and shows where it was", async () => {
    await start("let turns = 0;\nconsole.log('begun');\nfor (;;) turns++;");
    await page.waitForFunction("/begun/.test(Jupyter.notebook.get_cell(0).output_area.element.text())");
    await page.click("#int_interrupt, [data-jupyter-action='jupyter-notebook:interrupt-kernel']");
    await page.waitForFunction("Number.isInteger(Jupyter.notebook.get_cell(0).input_prompt_number)");
    await photograph("interrupt");
    const shown = (await page.evaluate("Jupyter.notebook.get_cell(0).output_area.element.text()")) as string;
    expect(shown).toContain("Interrupted");
    expect(await run("turns > 0")).toContain("true");
  });
});
