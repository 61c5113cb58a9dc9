// Modules that cells import, resolved from the folder of the notebook.
import nodeModule, { createRequire } from "node:module";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { constants, Script } from "node:vm";

import { initialize, LIBRARY, LIBRARY_KEY, loadBeside, resolveBeside } from "./typescript-modules.ts";

type Importer = (specifier: string, options?: object) => Promise<unknown>;

/** Imports for the cells of one notebook. */
export class Modules {
  readonly require: NodeJS.Require;
  /** What `import.meta` is in a cell. */
  readonly meta: Readonly<{ url: string; dirname: string; filename: string }>;
  readonly #library: Readonly<Record<string, unknown>>;
  readonly #import: Importer;
  #hooked = false;

  constructor(cwd: string, library: Readonly<Record<string, unknown>>) {
    this.#library = library;
    this.require = withLibrary(createRequire(join(cwd, "cell.js")), library);
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
    if (name === LIBRARY) return Promise.resolve(this.#library);
    if (/^(?:\.{1,2}\/|\/|file:)/.test(name)) this.#hook();
    if (/\.json$/.test(name) && options === undefined) return this.#import(name, { with: { type: "json" } });
    return this.#import(name, options);
  }

  /** From the first relative import on modules beside the notebook are understood; before it the hooks would cost a thread. */
  #hook(): void {
    if (this.#hooked) return;
    this.#hooked = true;
    Object.defineProperty(globalThis, Symbol.for(LIBRARY_KEY), { value: this.#library });
    const names = Object.keys(this.#library);
    // Stack traces then speak of the lines of the TypeScript (frames.ts).
    process.setSourceMapsEnabled(true);
    const { registerHooks } = nodeModule as unknown as { registerHooks?: (hooks: object) => void };
    if (!registerHooks) {
      nodeModule.register("./typescript-modules.js", { parentURL: import.meta.url, data: names });
      return;
    }
    initialize(names);
    registerHooks({
      resolve: (
        specifier: string,
        context: { parentURL?: string },
        next: (specifier: string, context: object) => unknown,
      ) => resolveBeside(specifier, context.parentURL) ?? next(specifier, context),
      load: (url: string, context: object, next: (url: string, context: object) => unknown) =>
        loadBeside(url) ?? next(url, context),
    });
  }
}

/** The `require` of a cell, with the library as the cells have it. */
function withLibrary(require: NodeJS.Require, library: Readonly<Record<string, unknown>>): NodeJS.Require {
  const wrapped = (id: string) => (id === LIBRARY ? library : require(id));
  return Object.assign(wrapped, require);
}
