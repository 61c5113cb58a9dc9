// halfperiod demo: the notebooks that come with the package, run here and now, with a page each.
import { mkdir, readdir } from "node:fs/promises";
import path from "node:path";
import { pathToFileURL } from "node:url";
import { packageRoot } from "../../service/info.ts";
import { executeFile } from "../execute-file.ts";
import { writeAtomically, writeNotebook } from "../file.ts";
import { notebookPage } from "../page/document.ts";
import { seconds } from "../progress.ts";
import type { Run } from "../run.ts";
import { colophon, summaryLines } from "../summary.ts";
import { type Console, EXIT, failedCell, readArguments, UsageError } from "./console.ts";
import { USAGE } from "./usage.ts";

/** Runs every notebook of notebooks-demo and writes the executed notebook and its page into the output folder. */
export async function demoCommand(args: readonly string[], { out, err }: Console): Promise<number> {
  const { values, positionals } = readArguments(args, { values: ["to"] }, USAGE.demo);
  if (positionals.length > 0) throw new UsageError(`"${positionals[0]}" is not expected`, USAGE.demo);
  const folder = path.resolve(values.to ?? "output");
  const source = path.join(packageRoot, "notebooks-demo");
  const names = (await readdir(source)).filter((name) => name.endsWith(".ipynb")).sort();
  if (names.length === 0) throw new UsageError(`no notebook in ${source}`, USAGE.demo);
  await mkdir(folder, { recursive: true });
  let code: number = EXIT.ok;
  for (const name of names) {
    const started = performance.now();
    const run = await executeFile(path.join(source, name), { screen: err });
    if (run.failure) {
      err.write(failedCell(name, run.total, run.failure));
      code = EXIT.failed;
    }
    const page = await writeBoth(run, folder, name);
    out.write(report(name, run, performance.now() - started, page));
  }
  return code;
}

async function writeBoth({ notebook }: Run, folder: string, file: string): Promise<string> {
  const name = path.basename(file, ".ipynb");
  const page = path.join(folder, `${name}.html`);
  await writeNotebook(path.join(folder, file), notebook);
  await writeAtomically(page, notebookPage(notebook, { name, colophon: colophon(notebook) }));
  return page;
}

function report(name: string, { reports, total, notebook }: Run, duration: number, page: string): string {
  const done = reports.filter(({ status }) => status === "ok").length;
  const rows: [string, string][] = [
    ["cells", `${done} of ${total} run in ${seconds(duration)}`],
    ...summaryLines(notebook),
    ["notebook", page.replace(/\.html$/, ".ipynb")],
    ["page", pathToFileURL(page).href],
  ];
  return `\n${name}\n${rows.map(([label, text]) => `  ${label.padEnd(10)}${text}\n`).join("")}`;
}
