// halfperiod export: a notebook as it is stored, in a form for readers.
import path from "node:path";
import { readNotebook, writeAtomically } from "../file.ts";
import { notebookPage } from "../page/document.ts";
import { colophon } from "../summary.ts";
import { type Console, EXIT, readArguments, UsageError } from "./console.ts";
import { USAGE } from "./usage.ts";

/** Writes the page of a notebook beside it, or to the file named by --to. Nothing is run. */
export async function exportCommand(args: readonly string[], { out }: Console): Promise<number> {
  const { values, positionals } = readArguments(args, { values: ["as", "to"] }, USAGE.export);
  const form = values.as ?? "html";
  const [file, ...others] = positionals;
  if (file === undefined || others.length > 0) throw new UsageError("one notebook is expected", USAGE.export);
  if (form !== "html") throw new UsageError(`--as ${form}; expected html`, USAGE.export);
  const name = path.basename(file, ".ipynb");
  const target = values.to ?? path.join(path.dirname(file), `${name}.html`);
  const notebook = await readNotebook(file);
  await writeAtomically(target, notebookPage(notebook, { name, colophon: colophon(notebook) }));
  out.write(`${target}\n`);
  return EXIT.ok;
}
