// A notebook as a plain TypeScript script: cells in order, operators written out, text cells as comments. It needs the
// library alone and prints what the notebook shows.
import path from "node:path";
import { placesOf } from "../../cell/types/host.ts";
import { NotebookTypes } from "../../cell/types/service.ts";
import type { WrittenCell, WrittenStatement } from "../../cell/types/written-cell.ts";
import { packageRoot, packageVersion } from "../../service/info.ts";
import { type Cell, type CodeCell, hasTag, isCode, type Notebook, NotebookError } from "../format.ts";
import { plainText } from "../page/terminal.ts";
import { Names } from "./names.ts";

export interface ScriptOptions {
  /** Name of the notebook, for the head and for complaints. */
  readonly name: string;
  /** Folder of the notebook: its imports are resolved from it. */
  readonly folder: string;
}

/**
 * The text of the script.
 *
 * Throws   NotebookError if a cell does not pass the type check, unless it is marked as meant to fail.
 */
export function notebookScript(notebook: Notebook, { name, folder }: ScriptOptions): string {
  const types = new NotebookTypes(placesOf(packageRoot, path.resolve(folder)));
  const names = new Names();
  const parts: string[] = [];
  const imports = new Imports();
  let count = 0;
  for (const cell of notebook.cells) {
    if (!isCode(cell)) parts.push(comment(cell));
    else if (cell.source.trim() !== "") parts.push(codePart(cell, ++count, types, names, imports, name));
  }
  const show = names.free("show");
  const body = parts
    .filter((part) => part !== "")
    .join("\n\n")
    .replaceAll(SHOW, show);
  return `${head(name)}\n${imports.text(show, body)}\n\n${body}\n`;
}

/** Stands for the printing function until all names are known. */
const SHOW = "\uE0F2show";

function head(name: string): string {
  return `// ${name}: the code of a notebook, written out by halfperiod ${packageVersion()}.
//
// Run it with Node 22.18 or later where the package "halfperiod" is installed:  node ${name}.ts
// Operators on values of the library are methods here, and numbers that a cell reads exactly are exact: rational("3/7").`;
}

function codePart(
  cell: CodeCell,
  count: number,
  types: NotebookTypes,
  names: Names,
  imports: Imports,
  name: string,
): string {
  const checked = types.check(count, count, cell.source);
  const mayFail = hasTag(cell, "raises-exception");
  if (checked.status === "error") {
    if (mayFail)
      return `// A cell that is meant to be refused (${checked.evalue.split("\n")[0]}):\n${commented(cell.source)}`;
    const trace = plainText(checked.traceback.join("\n"));
    throw new NotebookError(name, `code cell ${count} does not pass the check\n\n${trace}`);
  }
  const declared = types.declared(count);
  const rename = names.enter(
    declared,
    checked.emitted.boxes.filter((box) => box.origin === "library").map((box) => box.name),
  );
  const written = types.writeOut(rename) as WrittenCell;
  types.commit(count, declared, true);
  imports.add(written);
  const text = statements(written);
  return mayFail ? `try {\n${text}\n} catch (error) {\n  console.log(String(error));\n}` : text;
}

function statements({ statements: all, after }: WrittenCell): string {
  const lines = all.map((statement) => `${leading(statement)}${one(statement)}`);
  return [...lines, after.trim()].filter((line) => line !== "").join("\n");
}

function leading({ before }: WrittenStatement): string {
  const text = before.replace(/^\s*\n/, "\n").replace(/[ \t]+$/, "");
  return text.trim() === "" ? (/\n\s*\n/.test(before) ? "\n" : "") : text.replace(/^\n/, "");
}

function one({ text, isValue }: WrittenStatement): string {
  return isValue ? `${SHOW}(${text.replace(/;$/, "")});` : text;
}

function comment(cell: Cell): string {
  return cell.source.trim() === "" ? "" : commented(cell.source.trim());
}

function commented(text: string): string {
  return text.replace(/^/gm, "// ").replace(/[ \t]+$/gm, "");
}

/** What the script takes from the library. */
class Imports {
  readonly #values = new Set<string>();
  readonly #types = new Set<string>();
  #operators = false;

  add({ library, helpers }: WrittenCell): void {
    for (const { name, isType } of library) (isType ? this.#types : this.#values).add(name);
    for (const name of ["rational", "real"] as const) if (helpers[name]) this.#values.add(name);
    this.#operators ||= helpers.operators;
  }

  text(show: string, body: string): string {
    const shows = body.includes(`${show}(`);
    if (shows) this.#values.add("typeset");
    const values = [...this.#values].sort();
    const types = [...this.#types].filter((name) => !this.#values.has(name)).sort();
    const names = [...values, ...types.map((name) => `type ${name}`)];
    const lines = names.length > 0 ? [`import { ${names.join(", ")} } from "halfperiod";`] : [];
    if (this.#operators) lines.push(`import { operators } from "halfperiod/operators";`);
    if (/\brequire\b/.test(body)) {
      lines.push('import { createRequire } from "node:module";', "const require = createRequire(import.meta.url);");
    }
    if (shows) {
      lines.push(
        "",
        "/** Prints a value as the notebook shows it. */",
        `const ${show} = (value: unknown): void => {`,
        "  if (value !== undefined) typeset(value);",
        "};",
      );
    }
    return lines.join("\n");
  }
}
