// One archive for a referee: the notebook, its page and script, its values and certificates, and how to cite and check it.
// The same notebook gives the same bytes.
import { createHash } from "node:crypto";
import { readFileSync } from "node:fs";
import path from "node:path";
import { strToU8, type Zippable, zipSync } from "fflate";
import { packageRoot, packageVersion } from "../../service/info.ts";
import { isCode, type Notebook, NotebookError } from "../format.ts";
import { notebookLatex } from "../latex/document.ts";
import { pictureFiles } from "../latex/pictures.ts";
import { notebookPage } from "../page/document.ts";
import { notebookScript } from "../script/script.ts";
import { serialiseNotebook } from "../serialise.ts";
import { notebookSources } from "../sources.ts";
import { readStamp } from "../stamp.ts";
import { colophon, summaryLines } from "../summary.ts";
import { titleOf } from "../title.ts";
import { VALUE_TYPE } from "../values.ts";
import { certificatesOf } from "./certificates.ts";

export interface DossierOptions {
  readonly name: string;
  /** Folder of the notebook. */
  readonly folder: string;
}

export interface Dossier {
  readonly bytes: Uint8Array;
  /** Files inside, in order. */
  readonly files: readonly string[];
  /** What could not be put in, and why. */
  readonly left: readonly string[];
}

/** First moment that the archive's format can tell; the real one would make two dossiers of one notebook differ. */
const MOMENT = new Date(1980, 0, 1);

/** The archive of a notebook as it is stored; nothing is run. */
export function makeDossier(notebook: Notebook, options: DossierOptions): Dossier {
  const { name } = options;
  const files = new Map<string, string | Uint8Array>();
  const left: string[] = [];
  files.set(`${name}.ipynb`, serialiseNotebook(notebook));
  files.set(`${name}.html`, notebookPage(notebook, { name, colophon: colophon(notebook) }));
  addScript(notebook, options, files, left);
  addPaper(notebook, name, files);
  files.set("values.json", json(valuesOf(notebook)));
  files.set("certificates.json", json(certificatesOf(notebook)));
  files.set("CITATION.txt", citation(notebook, name));
  files.set("LICENSE.txt", readFileSync(path.join(packageRoot, "LICENSE"), "utf8"));
  files.set("README.txt", readme(notebook, name, files.has(`${name}.ts`)));
  files.set("manifest.json", json(manifest(notebook, files)));
  const zippable: Zippable = {};
  for (const [file, content] of files) {
    zippable[`${name}/${file}`] = typeof content === "string" ? strToU8(content) : content;
  }
  const bytes = zipSync(zippable, { level: 9, mtime: MOMENT, os: 0 });
  return { bytes, files: [...files.keys()], left };
}

type Files = Map<string, string | Uint8Array>;

/** A cell that does not pass the check has no script; the rest of the dossier is worth having all the same. */
function addScript(notebook: Notebook, { name, folder }: DossierOptions, files: Files, left: string[]): void {
  try {
    files.set(`${name}.ts`, notebookScript(notebook, { name, folder }));
  } catch (error) {
    if (!(error instanceof NotebookError)) throw error;
    left.push(`no script: ${error.given.split("\n")[0]}`);
  }
}

/** The LaTeX source with its pictures as SVG: a converter's PDF differs from machine to machine. */
function addPaper(notebook: Notebook, name: string, files: Files): void {
  const { tex, pictures } = notebookLatex(notebook, { name, colophon: colophon(notebook) });
  files.set(`${name}.tex`, tex);
  for (const { name: file, bytes } of pictureFiles(pictures).files) files.set(file, bytes);
}

function json(value: unknown): string {
  return `${JSON.stringify(value, undefined, 1)}\n`;
}

function valuesOf(notebook: Notebook): unknown {
  const cells = notebook.cells.filter(isCode).filter((cell) => cell.source.trim() !== "");
  return cells.map((cell, index) => ({
    cell: index + 1,
    ...(cell.id === undefined ? {} : { id: cell.id }),
    source: cell.source,
    values: cell.outputs.flatMap((output) =>
      "data" in output ? [{ text: output.data["text/plain"] ?? "", data: output.data[VALUE_TYPE] ?? null }] : [],
    ),
  }));
}

function manifest(notebook: Notebook, files: Files): unknown {
  const digest = (content: string | Uint8Array) => createHash("sha256").update(content).digest("hex");
  return {
    made: `halfperiod ${packageVersion()}`,
    stamp: readStamp(notebook) ?? null,
    files: [...files].map(([file, content]) => ({ file, sha256: digest(content) })),
  };
}

function citation(notebook: Notebook, name: string): string {
  const stamp = readStamp(notebook);
  const authors = Array.isArray(notebook.metadata.authors)
    ? notebook.metadata.authors.map((author) => String((author as { name?: unknown })?.name ?? "")).filter(Boolean)
    : [];
  const head = [authors.join(", "), `"${titleOf(notebook) ?? name}"`].filter(Boolean).join(": ");
  const run = stamp ? `, computed on ${stamp.date.slice(0, 10)}, code ${stamp.code}` : "";
  const sources = notebookSources(notebook);
  const lines = [
    "To cite this notebook:",
    `  ${head}. Notebook${run}.`,
    "",
    "To cite the program:",
    `  halfperiod ${stamp?.version ?? packageVersion()}: a notebook kernel for cubic curves, period lattices and elliptic functions,`,
    `  conventions of edition ${stamp?.edition ?? "1"}.`,
  ];
  if (sources.length > 0)
    lines.push("", "Sources that the derivations cite:", ...sources.map((source) => `  ${source}`));
  return `${lines.join("\n")}\n`;
}

function readme(notebook: Notebook, name: string, hasScript: boolean): string {
  const rows = summaryLines(notebook).map(([label, text]) => `  ${label}: ${text}`);
  const here = [
    [`${name}.ipynb`, "the notebook with its results"],
    [`${name}.html`, "the same as a page; opens in any browser, without a network"],
    [`${name}.tex`, "the same as the LaTeX source of a paper; its figures are beside it as SVG"],
    ...(hasScript ? [[`${name}.ts`, 'the code alone, for Node with the package "halfperiod"'] as const] : []),
    ["values.json", "every value as data: numbers are strings, enclosures have a middle and a radius"],
    ["certificates.json", "what can be checked by hand, each with what it asserts"],
    ["CITATION.txt", "how to cite the notebook and the program, and the sources of its derivations"],
    ["LICENSE.txt", "the licence of the program"],
    ["manifest.json", "the SHA-256 of every file, and the stamp of the run"],
  ] as const;
  const width = Math.max(...here.map(([file]) => file.length));
  return `${titleOf(notebook) ?? name}
${"=".repeat((titleOf(notebook) ?? name).length)}

What is here
${here.map(([file, what]) => `  ${file.padEnd(width)}  ${what}\n`).join("")}${rows.length > 0 ? `\nWhat it states\n${rows.join("\n")}\n` : ""}
To check it with the program
  halfperiod check ${name}.ipynb              (--confined if you do not know the author)
  It runs every cell in a fresh kernel and compares by mathematics: exact values are equal, enclosures overlap, claims keep
  their standing. A check shows that the code reproduces the stored values, not that the code is honest.

To check it by hand
  Take the entries of certificates.json: put the coordinates of a point into the equation, a map into the equation of its
  target, multiply out a matrix or a factorisation, count points modulo the primes named. A number of kind "real" lies
  within its radius of its middle, one of kind "complex" in the disc around (re, im).
`;
}
