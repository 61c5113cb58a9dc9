import { copyFileSync } from "node:fs";
import path from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openBrowser } from "./chromium.ts";
import { demoNotebooks, storedFigures } from "./demo.ts";
import { artefacts, CHROMIUM, type HostPlace, makePlace, missing } from "./hosts.ts";
import { NOTEBOOK_PROGRAM, type NotebookServer, startNotebookServer } from "./notebook-server.ts";

const absent = missing(
  { program: NOTEBOOK_PROGRAM, debianPackage: "jupyter-notebook" },
  { program: CHROMIUM, debianPackage: "chromium" },
);
if (absent) console.warn(`skipped, ${absent}`);

describe.skipIf(absent !== "")("the classic notebook in Chromium", () => {
  let place: HostPlace;
  let server: NotebookServer;
  let browser: Browser;
  beforeAll(async () => {
    place = makePlace();
    for (const file of demoNotebooks) copyFileSync(file, path.join(place.folder, path.basename(file)));
    server = await startNotebookServer(place, place.folder);
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser?.close();
    await server?.stop();
    place?.remove();
  });

  it.each(demoNotebooks)("opens %s, runs all cells, typesets and draws", async (file) => {
    const name = path.basename(file);
    const page = await browser.newPage({ viewport: { width: 1100, height: 1000 } });
    page.setDefaultTimeout(60_000);
    await page.goto(server.url(`notebooks/${name}`));
    await untilKernelIsReady(page);
    await page.evaluate("Jupyter.notebook.clear_all_output(); Jupyter.notebook.execute_all_cells()");
    await untilAllHaveRun(page);
    await untilTypeset(page);
    const seen = await look(page);
    await photograph(page, path.join(artefacts, `classic-${path.basename(name, ".ipynb")}.png`));
    expect(seen.errors).toEqual([]);
    expect(seen.counts).toEqual(seen.counts.map((_: unknown, index: number) => index + 1));
    expect(seen.typesetOutputs).toBeGreaterThanOrEqual(5);
    expect(seen.mathErrors).toEqual([]);
    expect(seen.figures).toBe(storedFigures(file));
    expect(seen.emptyFigures).toBe(0);
    expect(seen.tables).toBeGreaterThanOrEqual(1);
    await page.close();
  });
});

async function untilKernelIsReady(page: Page): Promise<void> {
  await page.waitForFunction(
    "window.Jupyter && Jupyter.notebook && Jupyter.notebook.kernel && Jupyter.notebook.kernel.is_connected() && Jupyter.notebook._fully_loaded",
    undefined,
    { timeout: 60_000 },
  );
}

async function untilAllHaveRun(page: Page): Promise<void> {
  // A cell that waits or runs shows a star for its number.
  const done = `Jupyter.notebook.get_cells().filter((cell) => cell.cell_type === "code")
    .every((cell) => Number.isInteger(cell.input_prompt_number))`;
  await page.waitForFunction(`${done} || document.querySelector(".output_error") !== null`, undefined, {
    timeout: 120_000,
  });
}

async function untilTypeset(page: Page): Promise<void> {
  await page.evaluate("new Promise((done) => MathJax.Hub.Queue(['Typeset', MathJax.Hub], () => done(true)))");
}

interface Seen {
  readonly errors: string[];
  readonly counts: number[];
  readonly typesetOutputs: number;
  readonly mathErrors: string[];
  readonly figures: number;
  readonly emptyFigures: number;
  readonly tables: number;
}

function look(page: Page): Promise<Seen> {
  return page.evaluate(`(() => {
    const all = (selector) => [...document.querySelectorAll(selector)];
    const svgs = all(".output_svg svg");
    return {
      errors: all(".output_error, .output_stderr").map((node) => node.textContent),
      counts: Jupyter.notebook.get_cells().filter((c) => c.cell_type === "code").map((c) => c.input_prompt_number),
      typesetOutputs: all(".output_area .MathJax").length,
      mathErrors: all(".MathJax_Error, .merror").map((node) => node.textContent),
      figures: svgs.length,
      emptyFigures: svgs.filter((svg) => svg.getBoundingClientRect().width < 100).length,
      tables: all(".output_area table").length,
    };
  })()`) as Promise<Seen>;
}

/** A picture of the whole notebook, not only of the part that its scrolling frame shows. */
async function photograph(page: Page, file: string): Promise<void> {
  const height = (await page.evaluate("document.querySelector('#notebook-container').scrollHeight + 200")) as number;
  await page.setViewportSize({ width: 1100, height: Math.min(height, 12_000) });
  await page.screenshot({ path: file });
}
