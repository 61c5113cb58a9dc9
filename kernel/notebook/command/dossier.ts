// halfperiod dossier: one archive for a coauthor or a referee.
import path from "node:path";
import { makeDossier } from "../dossier/dossier.ts";
import { readNotebook, writeAtomically } from "../file.ts";
import { type Console, EXIT, readArguments, tellEdits, UsageError } from "./console.ts";
import { USAGE } from "./usage.ts";

/** Writes the archive beside the notebook, or to the file named by --to. Nothing is run. */
export async function dossierCommand(args: readonly string[], { out, err }: Console): Promise<number> {
  const { values, positionals } = readArguments(args, { values: ["to"] }, USAGE.dossier);
  const [file, ...others] = positionals;
  if (file === undefined || others.length > 0) throw new UsageError("one notebook is expected", USAGE.dossier);
  const name = path.basename(file, ".ipynb");
  const target = values.to ?? path.join(path.dirname(file), `${name}.zip`);
  const notebook = await readNotebook(file);
  tellEdits(notebook, err);
  const { bytes, files, left } = makeDossier(notebook, { name, folder: path.dirname(file) });
  await writeAtomically(target, bytes);
  out.write(`${target}\n${files.map((inside) => `  ${name}/${inside}\n`).join("")}`);
  for (const words of left) err.write(`halfperiod: ${words}\n`);
  return EXIT.ok;
}
