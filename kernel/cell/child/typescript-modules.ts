// Loader hooks for modules beside the notebook: TypeScript (`import { f } from "./util.ts"`), and in all of them the library
// as the cells have it. Loaded into Node's loader.
import { existsSync, readFileSync, statSync } from "node:fs";
import { createRequire } from "node:module";
import { dirname, join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import type TS from "typescript";

interface Resolved {
  readonly url: string;
  readonly format?: string | null | undefined;
  readonly shortCircuit?: boolean;
}

interface Loaded {
  readonly format: string;
  readonly source: string;
  readonly shortCircuit: boolean;
}

const TYPESCRIPT = /\.[mc]?ts$/;

/** The library's specifier, its place, and the key under which the process of the cells holds it. */
export const LIBRARY = "halfperiod";
const LIBRARY_URL = "halfperiod:library";
export const LIBRARY_KEY = "halfperiod.library";

let libraryNames: readonly string[] = [];

/** Tells the names that the library exports. */
export function initialize(names: readonly string[]): void {
  libraryNames = names;
}

let compiler: typeof TS | undefined;

/** The library, or the file that a relative specifier means; the time of its last change makes edits another module. */
export function resolveBeside(specifier: string, parent: string | undefined): Resolved | undefined {
  if (specifier === LIBRARY) return { url: LIBRARY_URL, format: "module", shortCircuit: true };
  if (!/^(?:\.{1,2}\/|\/|file:)/.test(specifier)) return undefined;
  const url = new URL(specifier, parent);
  if (url.protocol !== "file:") return undefined;
  const file = fileOf(fileURLToPath(url));
  if (file === undefined) return undefined;
  const found = pathToFileURL(file);
  found.search = `?v=${lastChange(file, new Set())}`;
  return { url: found.href, ...(TYPESCRIPT.test(file) && { format: "module" }), shortCircuit: true };
}

/** The file of the user's that a path means: as it stands, with .ts, or .ts in place of .js. Packages are Node's business. */
function fileOf(wanted: string): string | undefined {
  if (/[\\/]node_modules[\\/]/.test(wanted)) return undefined;
  if (existsSync(wanted)) return /\.(?:[mc]?ts|m?js|json)$/.test(wanted) ? wanted : undefined;
  return [`${wanted}.ts`, wanted.replace(/\.js$/, ".ts")].find((one) => TYPESCRIPT.test(one) && existsSync(one));
}

const RELATIVE_IMPORT = /\b(?:from|import)\s*\(?\s*["'](\.{1,2}\/[^"'\n]+)["']/g;

/** When a file, or one that it imports by a relative path, was changed last. */
function lastChange(file: string, seen: Set<string>): number {
  if (seen.has(file)) return 0;
  seen.add(file);
  const own = statSync(file).mtimeMs;
  if (file.endsWith(".json")) return own;
  const imports = [...readFileSync(file, "utf8").matchAll(RELATIVE_IMPORT)].map(([, specifier = ""]) =>
    fileOf(join(dirname(file), specifier)),
  );
  return Math.max(own, ...imports.map((other) => (other === undefined ? 0 : lastChange(other, seen))));
}

/** The JavaScript of a TypeScript module, or of one that hands the library on: of a second copy no value would fit. */
export function loadBeside(url: string): Loaded | undefined {
  if (url === LIBRARY_URL) return { format: "module", source: librarySource(), shortCircuit: true };
  if (!url.startsWith("file:")) return undefined;
  const file = fileURLToPath(url);
  if (!TYPESCRIPT.test(file)) return undefined;
  compiler ??= createRequire(import.meta.url)("typescript") as typeof TS;
  const { ModuleKind, ScriptTarget } = compiler;
  const compilerOptions = { module: ModuleKind.ESNext, target: ScriptTarget.ES2022, inlineSourceMap: true };
  const { outputText } = compiler.transpileModule(readFileSync(file, "utf8"), { fileName: file, compilerOptions });
  return { format: "module", source: outputText, shortCircuit: true };
}

function librarySource(): string {
  const held = `const held = globalThis[Symbol.for(${JSON.stringify(LIBRARY_KEY)})];`;
  const lines = libraryNames.map(
    (name, k) => `const v${k} = held[${JSON.stringify(name)}]; export { v${k} as ${name} };`,
  );
  return [held, ...lines].join("\n");
}

type NextResolve = (specifier: string, context: object) => Promise<Resolved>;
type NextLoad = (url: string, context: object) => Promise<Loaded>;

/** Hook of `module.register`, for Node before 22.15. */
export async function resolve(
  specifier: string,
  context: { readonly parentURL?: string },
  next: NextResolve,
): Promise<Resolved> {
  return resolveBeside(specifier, context.parentURL) ?? next(specifier, context);
}

/** Hook of `module.register`. */
export async function load(url: string, context: object, next: NextLoad): Promise<Loaded> {
  return loadBeside(url) ?? next(url, context);
}
