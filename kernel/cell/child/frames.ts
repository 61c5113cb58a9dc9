// Stack traces in the user's terms: cells by number, TypeScript positions, no machinery.
import { findSourceMap, SourceMap } from "node:module";
import { fileURLToPath } from "node:url";
import type { SourceMapData } from "../types/sourcemap.ts";

/** One frame of a stack, as the user knows it. */
export interface Frame {
  /** The called function, "" at the top of a cell. */
  readonly name: string;
  /** Execution count of the cell; undefined for files. */
  readonly count?: number;
  readonly code?: string;
  readonly file?: string;
  readonly line: number;
  readonly column: number;
}

interface Script {
  readonly count: number;
  readonly code: string;
  readonly map: SourceMap;
  readonly prefix: string;
}

const MACHINERY = fileURLToPath(new URL("./", import.meta.url));
const LIBRARY = fileURLToPath(new URL("../../../lib/", import.meta.url));
const LAUNCHER = fileURLToPath(new URL("../../../../kernel/bin/load.cjs", import.meta.url));
/** Bundles of the same modules: the library has a file of its own there. */
const BUNDLES = fileURLToPath(new URL("../../../start/", import.meta.url));
const LIBRARY_BUNDLE = `${BUNDLES}library.cjs`;
const LONGEST_STACK = 40;

/** Whether a file is part of the machinery that runs cells. */
export function isMachinery(file: string): boolean {
  const plain = plainFile(file);
  return plain.startsWith(MACHINERY) || LAUNCHER === plain || (plain.startsWith(BUNDLES) && plain !== LIBRARY_BUNDLE);
}

export function isLibrary(file: string): boolean {
  const plain = plainFile(file);
  return plain === LIBRARY_BUNDLE || plain.startsWith(LIBRARY);
}

function plainFile(file: string): string {
  return file.startsWith("file:") ? fileURLToPath(file) : file;
}

/** The scripts of the cells, and the frames of the errors that were thrown. */
export class Frames {
  readonly #scripts = new Map<string, Script>();
  readonly #frames = new WeakMap<object, Frame[]>();

  register(file: string, count: number, code: string, map: SourceMapData, prefix: string): void {
    const payload = {
      ...map,
      file,
      sourcesContent: [code],
      sourceRoot: "",
      sources: [...map.sources],
      names: [...map.names],
    };
    this.#scripts.set(file, { count, code, map: new SourceMap(payload), prefix });
  }

  /** Makes every stack of this process speak of cells. */
  install(): void {
    Error.stackTraceLimit = LONGEST_STACK;
    Error.prepareStackTrace = (error, sites) => {
      const frames = this.read(sites);
      this.#frames.set(error, frames);
      return [headline(error), ...frames.map((frame) => `    at ${describe(frame)}`)].join("\n");
    };
  }

  /** The frames of an error; reading its stack computes them. */
  of(error: object): readonly Frame[] {
    void (error as { stack?: unknown }).stack;
    return this.#frames.get(error) ?? [];
  }

  /** The user's frames among call sites: cells, files of the user, packages. */
  read(sites: readonly NodeJS.CallSite[]): Frame[] {
    return sites.flatMap((site) => {
      const file = site.getFileName() ?? site.getScriptNameOrSourceURL() ?? "";
      const line = site.getLineNumber() ?? 0;
      const column = site.getColumnNumber() ?? 0;
      const script = this.#scripts.get(file);
      if (script) return mapped(script, site, line, column);
      if (file === "" || file.startsWith("node:") || isMachinery(file)) return [];
      return [{ name: site.getFunctionName() ?? "", file: plainFile(file), ...inSource(file, line, column) }];
    });
  }

  /** A message of the engine with the user's names for boxes: `(0 , $f.v)` is f. */
  demangle(message: string): string {
    return message
      .replace(/\(0\s*,\s*\$+([\p{ID_Continue}$]+)\.v\)/gu, "$1")
      .replace(/\$+([\p{ID_Start}_][\p{ID_Continue}$]*)\.[vc]\b/gu, "$1");
  }
}

/** The place in a TypeScript module beside the notebook: Node keeps the map that came with the code. */
function inSource(file: string, line: number, column: number): { line: number; column: number } {
  if (!/\.[mc]?ts(?:\?|$)/.test(file)) return { line, column };
  const map = findSourceMap(file) as SourceMap | undefined;
  if (!map) return { line, column };
  const entry = map.findEntry(line - 1, column - 1);
  if (!("originalLine" in entry)) return { line, column };
  return { line: entry.originalLine + 1, column: entry.originalColumn + 1 };
}

function mapped(script: Script, site: NodeJS.CallSite, line: number, column: number): Frame[] {
  const entry = script.map.findEntry(line - 1, column - 1);
  if (!("originalLine" in entry)) return [];
  const name = site.getFunctionName() ?? "";
  return [
    {
      name: name.startsWith("$") || name === "eval" ? "" : name,
      count: script.count,
      code: script.code,
      line: entry.originalLine + 1,
      column: entry.originalColumn + 1,
    },
  ];
}

function headline(error: unknown): string {
  try {
    const { name, message } = error as Error;
    return message ? `${name}: ${message}` : String(name);
  } catch {
    return "Error";
  }
}

/** "f, in cell 3, line 2, column 5" */
export function describe(frame: Frame): string {
  const place = frame.count === undefined ? frame.file : `in cell ${frame.count}`;
  return `${frame.name ? `${frame.name}, ` : ""}${place}, line ${frame.line}, column ${frame.column}`;
}
