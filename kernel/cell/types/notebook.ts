// The names of the notebook as the checker sees them: which cell defined a name last, and how a later cell gets it.
import { type Inlined, inlinable, inlinedText } from "./inlined.ts";
import type { Declared, NameKind } from "./outline.ts";

/** A name that a cell has defined. */
export interface NotebookName extends Declared {
  /** Number of the cell whose file exports it. */
  readonly cell: number;
  /** Its declaration, where that can stand in another cell. */
  readonly inlined: Inlined | undefined;
}

/** Import specifier of the file of a cell; the host resolves it. */
export function cellSpecifier(cell: number): string {
  return `./halfperiod-cell-${cell}`;
}

/** The number in the specifier or file name of a cell. */
export function cellNumber(specifier: string): number | undefined {
  const match = /(?:^|[\\/])halfperiod-cell-(\d+)(?:\.d)?(?:\.[jt]s)?$/.exec(specifier);
  return match ? Number(match[1]) : undefined;
}

export const LIBRARY = "halfperiod";

const ASSIGNABLE: ReadonlySet<NameKind> = new Set<NameKind>(["let", "var"]);

/** Names of earlier cells; a later definition of a name replaces an earlier one. */
export class NotebookNames {
  readonly #names = new Map<string, NotebookName>();

  get(name: string): NotebookName | undefined {
    return this.#names.get(name);
  }

  values(): IterableIterator<NotebookName> {
    return this.#names.values();
  }

  /** Takes over the names of a cell that ran; `text` are its declarations. */
  define(cell: number, declared: readonly Declared[], text: string): void {
    const inlined = inlinable(text, declared);
    for (const one of declared) {
      if (one.kind !== "using") this.#names.set(one.name, { ...one, cell, inlined: inlined.get(one.name) });
    }
  }

  get size(): number {
    return this.#names.size;
  }

  clear(): void {
    this.#names.clear();
  }

  /** Cells whose files are still needed by a name. */
  cells(): Set<number> {
    return new Set([...this.#names.values()].map((name) => name.cell));
  }
}

export interface Surroundings {
  /** Text behind the user's text: imports of what it uses, exports of what it defines. */
  readonly text: string;
  /** Names that come from the library. */
  readonly library: ReadonlySet<string>;
  /** Names of earlier cells that are there. */
  readonly notebook: readonly NotebookName[];
}

/** Whether a cell can meet a value of the library: by a name of it, or of an earlier cell, or by an import. */
export function seesLibrary(around: Surroundings, words: ReadonlySet<string>): boolean {
  return around.library.size > 0 || around.notebook.length > 0 || words.has(LIBRARY);
}

/**
 * Surroundings of a cell.
 *
 * `wanted` are the words of the cell (or every name, for completion); names that the cell declares are its own. `types` is
 * a name for the library in declarations of earlier cells.
 */
export function surroundings(
  wanted: (name: string) => boolean,
  own: ReadonlyMap<string, Declared>,
  notebook: NotebookNames,
  libraryNames: Iterable<string>,
  types: string,
): Surroundings {
  const lines: string[] = ["", ";export {};"];
  const used = [...notebook.values()].filter(({ name }) => !own.has(name) && wanted(name));
  const library = new Set<string>();
  for (const name of libraryNames) {
    if (!own.has(name) && !notebook.get(name) && wanted(name)) library.add(name);
  }
  const here = (name: string) => own.has(name) || library.has(name) || notebook.get(name) !== undefined;
  for (const name of used) {
    const { inlined } = name;
    const fits = inlined !== undefined && ![...inlined.free].some(here);
    lines.push(fits ? inlinedText(inlined, types) : importLine(name));
  }
  // Also when nothing is used: a program is taken over if its root imports the same modules as before.
  lines.push(`import { ${[...library].join(", ")} } from "${LIBRARY}";`, `import * as ${types} from "${LIBRARY}";`);
  const exported = [...own.values()].filter((declared) => declared.kind !== "using").map((declared) => declared.name);
  if (exported.length > 0) lines.push(`export { ${exported.join(", ")} };`);
  return { text: lines.join("\n"), library, notebook: used };
}

function importLine(name: NotebookName): string {
  const from = cellSpecifier(name.cell);
  if (!ASSIGNABLE.has(name.kind)) return `import { ${name.name} } from "${from}";`;
  return `declare let ${name.name}: typeof import("${from}").${name.name};`;
}
