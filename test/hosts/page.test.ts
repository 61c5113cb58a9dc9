import { mkdirSync } from "node:fs";
import path from "node:path";
import { pathToFileURL } from "node:url";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openBrowser } from "./chromium.ts";
import { demoNotebooks, storedFigures } from "./demo.ts";
import { artefacts, CHROMIUM, missing, root, run } from "./hosts.ts";

const absent = missing({ program: CHROMIUM, debianPackage: "chromium" });
if (absent) console.warn(`skipped, ${absent}`);

describe.skipIf(absent !== "")("the pages of the demonstration in Chromium, network off", () => {
  const folder = path.join(artefacts, "pages");
  let browser: Browser;
  let said: string;
  beforeAll(async () => {
    mkdirSync(folder, { recursive: true });
    said = await run(
      process.execPath,
      [path.join(root, "kernel/bin/halfperiod.mjs"), "demo", "--to", folder],
      process.env,
    );
    browser = await openBrowser();
  });
  afterAll(() => browser?.close());

  it("are announced with what was run, claimed and proved", () => {
    expect(said).toMatch(/cells +(\d+) of \1 run/);
    expect(said).toMatch(/claims +(\d+) of \1 met/);
    expect(said).toMatch(/\d+ or more proved digits/);
  });

  it.each(demoNotebooks)("%s: opens from disk, whole, without a fetch", async (file) => {
    const name = path.basename(file, ".ipynb");
    const context = await browser.newContext({ offline: true, viewport: { width: 1000, height: 900 } });
    const page = await context.newPage();
    const complaints: string[] = [];
    const requests: string[] = [];
    page.on("console", (message) => complaints.push(message.text()));
    page.on("request", (request) => requests.push(request.url()));
    const address = pathToFileURL(path.join(folder, `${name}.html`)).href;
    await page.goto(address);
    expect(requests.filter((url) => url !== address && !url.startsWith("data:"))).toEqual([]);
    expect(complaints).toEqual([]);
    const seen = await look(page);
    await page.screenshot({ path: path.join(folder, `${name}.png`), fullPage: true });
    await page.emulateMedia({ colorScheme: "dark" });
    await page.screenshot({ path: path.join(folder, `${name}-dark.png`), fullPage: true });
    await page.emulateMedia({ colorScheme: "light" });
    await page.pdf({ path: path.join(folder, `${name}.pdf`), preferCSSPageSize: true });
    await context.close();
    expect(seen.headings).toBe(1);
    expect(seen.formulas).toBeGreaterThanOrEqual(10);
    expect(seen.unread).toEqual([]);
    expect(seen.flat).toEqual([]);
    expect(seen.figures).toBe(storedFigures(file));
    expect(seen.unnamedFigures).toBe(0);
    expect(seen.tablesWithHeads).toBeGreaterThanOrEqual(1);
    expect(seen.failures).toEqual([]);
    expect(seen.sticksOut).toBeLessThanOrEqual(0);
  });
});

interface Seen {
  readonly headings: number;
  readonly formulas: number;
  readonly unread: string[];
  /** Formulas that take no room: a renderer without MathML would leave them so. */
  readonly flat: string[];
  readonly figures: number;
  readonly unnamedFigures: number;
  readonly tablesWithHeads: number;
  readonly failures: string[];
  /** Pixels by which the page is wider than the window. */
  readonly sticksOut: number;
}

function look(page: Page): Promise<Seen> {
  return page.evaluate(`(() => {
    const all = (selector) => [...document.querySelectorAll(selector)];
    const size = (node) => node.getBoundingClientRect();
    const named = (svg) => svg.getAttribute("aria-label") || (svg.querySelector("title") || {}).textContent;
    return {
      headings: all("h1").length,
      formulas: all("math").length,
      unread: all(".unread").map((node) => node.textContent),
      flat: all("math").filter((node) => size(node).height < 4).map((node) => node.textContent),
      figures: all("figure svg").filter((svg) => size(svg).width > 100).length,
      unnamedFigures: all("figure svg").filter((svg) => !named(svg)).length,
      tablesWithHeads: all("table").filter((table) => table.querySelector("th[scope]")).length,
      failures: all(".failure").map((node) => node.textContent),
      sticksOut: document.documentElement.scrollWidth - innerWidth,
    };
  })()`) as Promise<Seen>;
}
