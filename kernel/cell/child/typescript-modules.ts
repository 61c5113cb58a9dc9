// Loader hooks for TypeScript modules beside the notebook: `import { f } from "./util.ts"`. Loaded into Node's loader.
import { existsSync, readFileSync, statSync } from "node:fs";
import { createRequire } from "node:module";
import { fileURLToPath } from "node:url";
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

let compiler: typeof TS | undefined;

/** The module that a relative specifier means, if it is TypeScript; its time of change makes edits another module. */
export function resolveTypeScript(specifier: string, parent: string | undefined): Resolved | undefined {
  if (!/^(?:\.{1,2}\/|\/|file:)/.test(specifier)) return undefined;
  const url = new URL(specifier, parent);
  if (url.protocol !== "file:") return undefined;
  const wanted = fileURLToPath(url);
  const candidates = TYPESCRIPT.test(wanted) ? [wanted] : [`${wanted}.ts`, wanted.replace(/\.js$/, ".ts")];
  const file =
    existsSync(wanted) && !TYPESCRIPT.test(wanted)
      ? undefined
      : candidates.find((one) => TYPESCRIPT.test(one) && existsSync(one));
  if (file === undefined) return undefined;
  const found = new URL(url);
  found.pathname = found.pathname.replace(/[^/]*$/, encodeURIComponent(file.split(/[\\/]/).at(-1) as string));
  found.search = `?v=${statSync(file).mtimeMs}`;
  return { url: found.href, format: "module", shortCircuit: true };
}

/** The JavaScript of a TypeScript module. */
export function loadTypeScript(url: string): Loaded | undefined {
  if (!url.startsWith("file:")) return undefined;
  const file = fileURLToPath(url);
  if (!TYPESCRIPT.test(file)) return undefined;
  compiler ??= createRequire(import.meta.url)("typescript") as typeof TS;
  const { ModuleKind, ScriptTarget } = compiler;
  const compilerOptions = { module: ModuleKind.ESNext, target: ScriptTarget.ES2022, inlineSourceMap: true };
  const { outputText } = compiler.transpileModule(readFileSync(file, "utf8"), { fileName: file, compilerOptions });
  return { format: "module", source: outputText, shortCircuit: true };
}

type NextResolve = (specifier: string, context: object) => Promise<Resolved>;
type NextLoad = (url: string, context: object) => Promise<Loaded>;

/** Hook of `module.register`, for Node before 22.15. */
export async function resolve(
  specifier: string,
  context: { readonly parentURL?: string },
  next: NextResolve,
): Promise<Resolved> {
  return resolveTypeScript(specifier, context.parentURL) ?? next(specifier, context);
}

/** Hook of `module.register`. */
export async function load(url: string, context: object, next: NextLoad): Promise<Loaded> {
  return loadTypeScript(url) ?? next(url, context);
}
