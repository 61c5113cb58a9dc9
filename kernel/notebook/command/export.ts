// halfperiod export: a notebook as it is stored, in a form for readers.
import path from "node:path";
import { readNotebook, writeAtomically } from "../file.ts";
import type { Notebook } from "../format.ts";
import { colophon } from "../summary.ts";
import { type Console, EXIT, readArguments, tellEdits, UsageError } from "./console.ts";
import { USAGE } from "./usage.ts";

/** One file of an export; the first of a list is the one asked for. */
interface Written {
  readonly name: string;
  readonly content: string | Uint8Array;
}

interface Form {
  readonly extension: string;
  /** `name` is that of the file to write, without extension; `folder` that of the notebook. */
  files(notebook: Notebook, name: string, folder: string): Promise<{ files: readonly Written[]; advice?: string }>;
}

const FORMS: Readonly<Record<string, Form>> = {
  html: {
    extension: ".html",
    async files(notebook, name) {
      const { notebookPage } = await import("../page/document.ts");
      return {
        files: [{ name: `${name}.html`, content: notebookPage(notebook, { name, colophon: colophon(notebook) }) }],
      };
    },
  },
  latex: {
    extension: ".tex",
    async files(notebook, name) {
      const { notebookLatex } = await import("../latex/document.ts");
      const { CONVERTER, pictureFiles } = await import("../latex/pictures.ts");
      const { tex, pictures } = notebookLatex(notebook, { name, colophon: colophon(notebook) });
      const { files, advice } = pictureFiles(pictures, CONVERTER);
      const beside = files.map(({ name: file, bytes }) => ({ name: file, content: bytes }));
      return { files: [{ name: `${name}.tex`, content: tex }, ...beside], ...(advice === undefined ? {} : { advice }) };
    },
  },
  ts: {
    extension: ".ts",
    async files(notebook, name, folder) {
      const { notebookScript } = await import("../script/script.ts");
      return { files: [{ name: `${name}.ts`, content: notebookScript(notebook, { name, folder }) }] };
    },
  },
};

/** Writes a notebook's page, paper or script beside it, or to the file named by --to. Nothing is run. */
export async function exportCommand(args: readonly string[], { out, err }: Console): Promise<number> {
  const { values, positionals } = readArguments(args, { values: ["as", "to"] }, USAGE.export);
  const [file, ...others] = positionals;
  if (file === undefined || others.length > 0) throw new UsageError("one notebook is expected", USAGE.export);
  const as = values.as ?? "html";
  const form = Object.hasOwn(FORMS, as) ? FORMS[as] : undefined;
  if (!form) throw new UsageError(`--as ${as}; expected ${Object.keys(FORMS).join(", ")}`, USAGE.export);
  const target = values.to ?? path.join(path.dirname(file), `${path.basename(file, ".ipynb")}${form.extension}`);
  const notebook = await readNotebook(file);
  tellEdits(notebook, err);
  const name = path.basename(target, form.extension);
  const { files, advice } = await form.files(notebook, name, path.dirname(file));
  for (const [index, { name: written, content }] of files.entries()) {
    const place = index === 0 ? target : path.join(path.dirname(target), written);
    await writeAtomically(place, content);
    out.write(`${place}\n`);
  }
  if (advice !== undefined) err.write(`halfperiod: ${advice}\n`);
  return EXIT.ok;
}
