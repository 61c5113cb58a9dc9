// Modules that cells import, resolved from the folder of the notebook.
import { createRequire } from "node:module";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { constants, Script } from "node:vm";

type Importer = (specifier: string, options?: object) => Promise<unknown>;

/** Imports for the cells of one notebook. */
export class Modules {
  readonly require: NodeJS.Require;
  /** What `import.meta` is in a cell. */
  readonly meta: Readonly<{ url: string; dirname: string; filename: string }>;
  readonly #library: Readonly<Record<string, unknown>>;
  readonly #import: Importer;

  constructor(cwd: string, library: Readonly<Record<string, unknown>>) {
    this.#library = library;
    this.require = createRequire(join(cwd, "cell.js"));
    const url = pathToFileURL(join(cwd, "cell.ts")).href;
    this.meta = Object.freeze({ url, dirname: cwd, filename: join(cwd, "cell.ts") });
    // Relative imports resolve only from a script with an absolute name.
    this.#import = new Script("(specifier, options) => import(specifier, options)", {
      filename: join(cwd, "cell.js"),
      importModuleDynamically: constants.USE_MAIN_CONTEXT_DEFAULT_LOADER,
    }).runInThisContext() as Importer;
  }

  import(specifier: unknown, options?: object): Promise<unknown> {
    const name = String(specifier);
    if (name === "halfperiod") return Promise.resolve(this.#library);
    if (/\.json$/.test(name) && options === undefined) return this.#import(name, { with: { type: "json" } });
    return this.#import(name, options);
  }
}
