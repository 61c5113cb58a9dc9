// What the language service reads: the files of the cells from memory, everything else from disk.

import { existsSync, readFileSync, statSync } from "node:fs";
import { isBuiltin } from "node:module";
import { dirname, join } from "node:path";
import { BASICS } from "./basics.ts";
import { cellNumber, LIBRARY } from "./notebook.ts";
import { OPERATORS } from "./operators.ts";
import { type TS, ts } from "./typescript.ts";

/** Modules of Node itself are declared by the node types; there is no file to look for. */
const NOT_FOUND: TS.ResolvedModuleWithFailedLookupLocations = { resolvedModule: undefined };

interface CellFile {
  version: number;
  snapshot: TS.IScriptSnapshot;
}

/** Where the library's declarations and the node types are. */
export interface Places {
  /** Folder of the notebook. */
  readonly cwd: string;
  /** `index.d.ts` of the library. */
  readonly library: string;
  /** Folder that holds `@types/node`. */
  readonly typeRoots: readonly string[];
  /** Present: only files in these folders are read. */
  readonly onlyIn?: readonly string[];
}

/** Strict, save where strictness only annoys in a notebook. */
export function compilerOptions(): TS.CompilerOptions {
  return {
    target: ts.ScriptTarget.ES2023,
    module: ts.ModuleKind.ESNext,
    moduleResolution: ts.ModuleResolutionKind.Bundler,
    customConditions: ["node"],
    lib: ["lib.es2023.d.ts"],
    types: [],
    strict: true,
    skipLibCheck: true,
    declaration: true,
    sourceMap: true,
    preserveConstEnums: true,
    resolveJsonModule: true,
    esModuleInterop: true,
    rewriteRelativeImportExtensions: true,
    allowUnreachableCode: true,
    allowUnusedLabels: true,
    newLine: ts.NewLineKind.LineFeed,
    noErrorTruncation: false,
    forceConsistentCasingInFileNames: true,
  };
}

// Files of packages and of the library, shared by the notebooks of a process; a snapshot keeps them.
const disk = new Map<string, TS.IScriptSnapshot | undefined>();
const settledModules = new Map<string, TS.ResolvedModuleWithFailedLookupLocations>();
/** Parsed files, shared in the same way. */
export const registry: TS.DocumentRegistry = ts.createDocumentRegistry();

/**
 * Folder of the files of the cells, which exist in memory alone. The same for all notebooks, so that a program made in
 * advance serves every one; what a cell imports is looked for from the notebook's own folder.
 */
const FOLDER = "/halfperiod";
const BASICS_FILE = `${FOLDER}/basics.d.ts`;
const BASICS_TEXT = ts.ScriptSnapshot.fromString(BASICS);

/** Versions of cells rise over all notebooks of a process: they share the registry, which knows files by name and version. */
let lastVersion = 0;

/** Host of the language service of one notebook. */
export class NotebookHost implements TS.LanguageServiceHost {
  #places: Places;
  readonly #options: TS.CompilerOptions = compilerOptions();
  readonly #cells = new Map<number, CellFile>();
  #resolutions: TS.ModuleResolutionCache;
  readonly #libraryFolder: string;
  readonly #operatorsFile: string;
  /** A module was missing: it may be there for the next cell. */
  #forget = false;
  #root: string[] = [];
  /** Whether Node's whole types are read, or only the basics. */
  #wholeNode: boolean;

  constructor(places: Places, wholeNode: boolean) {
    this.#places = places;
    this.#wholeNode = wholeNode;
    this.#libraryFolder = dirname(places.library);
    this.#operatorsFile = join(this.#libraryFolder, "surface", "operators.d.ts");
    this.#resolutions = ts.createModuleResolutionCache(places.cwd, (name) => name, this.#options);
  }

  /** Turns to the notebook of another folder, with the same installation. */
  move(places: Places): void {
    this.#places = places;
    this.#resolutions = ts.createModuleResolutionCache(places.cwd, (name) => name, this.#options);
  }

  get wholeNode(): boolean {
    return this.#wholeNode;
  }

  /** From the next cell on Node's whole types are there. */
  readWholeNode(): void {
    this.#wholeNode = true;
  }

  /** Folder of Node's types, if there is one. */
  get nodeFolder(): string | undefined {
    return this.#places.typeRoots.map((root) => join(root, "node")).find((folder) => existsSync(folder));
  }

  get confined(): boolean {
    return this.#places.onlyIn !== undefined;
  }

  /** Folder of the library's declarations. */
  get libraryFolder(): string {
    return this.#libraryFolder;
  }

  cellFile(cell: number): string {
    return `${FOLDER}/halfperiod-cell-${cell}.ts`;
  }

  /** Sets the text of a cell's file, and makes it the root of the next program if asked. */
  setCell(cell: number, text: string, root: boolean): void {
    if (this.#forget) this.#resolutions.clear();
    this.#forget = false;
    lastVersion++;
    this.#cells.set(cell, { version: lastVersion, snapshot: ts.ScriptSnapshot.fromString(text) });
    // The library is always part of the program: else its parsed files are dropped by every cell that does not use it.
    if (root) this.#root = [this.cellFile(cell), this.#places.library, this.#operatorsFile, this.#globals()];
  }

  /** File of the globals that are not of the language. */
  #globals(): string {
    const folder = this.#wholeNode ? this.nodeFolder : undefined;
    return folder === undefined ? BASICS_FILE : join(folder, "index.d.ts");
  }

  dropCell(cell: number): void {
    this.#cells.delete(cell);
  }

  cellText(cell: number): string | undefined {
    const snapshot = this.#cells.get(cell)?.snapshot;
    return snapshot?.getText(0, snapshot.getLength());
  }

  getCompilationSettings(): TS.CompilerOptions {
    return this.#options;
  }

  getScriptFileNames(): string[] {
    return this.#root;
  }

  getScriptVersion(file: string): string {
    const cell = this.#cell(file);
    if (cell) return String(cell.version);
    if (file === BASICS_FILE) return "0";
    // A module of the user beside the notebook may be edited between two cells.
    return this.#isSettled(file) ? "0" : String(statSync(file, { throwIfNoEntry: false })?.mtimeMs ?? 0);
  }

  getScriptSnapshot(file: string): TS.IScriptSnapshot | undefined {
    const cell = this.#cell(file);
    if (cell) return cell.snapshot;
    if (file === BASICS_FILE) return BASICS_TEXT;
    if (disk.has(file)) return disk.get(file);
    const snapshot =
      this.#isOpen(file) && existsSync(file) ? ts.ScriptSnapshot.fromString(readFileSync(file, "utf8")) : undefined;
    // Files of the user beside the notebook may change; those of packages do not.
    if (this.#isSettled(file)) disk.set(file, snapshot);
    return snapshot;
  }

  getCurrentDirectory(): string {
    return FOLDER;
  }

  getDefaultLibFileName(options: TS.CompilerOptions): string {
    return ts.getDefaultLibFilePath(options);
  }

  getNewLine(): string {
    return "\n";
  }

  fileExists(file: string): boolean {
    return file === BASICS_FILE || this.#cell(file) !== undefined || (this.#isOpen(file) && ts.sys.fileExists(file));
  }

  readFile(file: string, encoding?: string): string | undefined {
    return this.#isOpen(file) ? ts.sys.readFile(file, encoding) : undefined;
  }

  directoryExists(directory: string): boolean {
    return this.#isOpen(directory) && ts.sys.directoryExists(directory);
  }

  getDirectories(directory: string): string[] {
    return this.#isOpen(directory) ? ts.sys.getDirectories(directory) : [];
  }

  realpath(file: string): string {
    return this.#cell(file) ? file : (ts.sys.realpath?.(file) ?? file);
  }

  /** Shared with the program, which else reads the package.json above every file again and again. */
  getModuleResolutionCache(): TS.ModuleResolutionCache {
    return this.#resolutions;
  }

  resolveModuleNameLiterals(
    literals: readonly TS.StringLiteralLike[],
    containingFile: string,
    redirected: TS.ResolvedProjectReference | undefined,
    options: TS.CompilerOptions,
  ): readonly TS.ResolvedModuleWithFailedLookupLocations[] {
    const settled = this.#isSettled(containingFile);
    return literals.map(({ text }) => {
      const own = this.#ownModule(text);
      if (own)
        return {
          resolvedModule: { resolvedFileName: own, extension: extensionOf(own), isExternalLibraryImport: false },
        };
      if (isBuiltin(text) || (this.#places.onlyIn && this.#cell(containingFile))) return NOT_FOUND;
      const key = `${text} ${containingFile}`;
      const known = settled ? settledModules.get(key) : undefined;
      if (known) return known;
      const found = this.#resolve(text, containingFile, options, redirected);
      if (settled) settledModules.set(key, found);
      else if (!found.resolvedModule) this.#forget = true;
      return found;
    });
  }

  /** What a cell imports is looked for from the notebook's folder. */
  #resolve(
    text: string,
    from: string,
    options: TS.CompilerOptions,
    redirected: TS.ResolvedProjectReference | undefined,
  ): TS.ResolvedModuleWithFailedLookupLocations {
    const inCell = from.startsWith(`${FOLDER}/`);
    const place = inCell ? join(this.#places.cwd, "cell.ts") : from;
    const found = ts.resolveModuleName(text, place, options, this, this.#resolutions, redirected);
    if (found.resolvedModule || !inCell || !text.startsWith("..")) return found;
    // A path that the compiler itself wrote into the declarations of a cell starts from where it believes the cell is.
    return ts.resolveModuleName(text, from, options, this, this.#resolutions, redirected);
  }

  /** Whether a file may be read: of a confined notebook no other than those of the installation. */
  #isOpen(file: string): boolean {
    const { onlyIn } = this.#places;
    if (!onlyIn) return true;
    const real = ts.sys.realpath?.(file) ?? file;
    return onlyIn.some((folder) => real === folder || real.startsWith(`${folder}/`) || real.startsWith(`${folder}\\`));
  }

  /** Files of packages and of the library do not change while a notebook runs; those of the user may. */
  #isSettled(file: string): boolean {
    return file.includes("/node_modules/") || file.startsWith(this.#libraryFolder);
  }

  #ownModule(specifier: string): string | undefined {
    if (specifier === LIBRARY) return this.#places.library;
    if (specifier === OPERATORS) return this.#operatorsFile;
    const cell = cellNumber(specifier);
    return cell !== undefined && this.#cells.has(cell) ? this.cellFile(cell) : undefined;
  }

  #cell(file: string): CellFile | undefined {
    const number = cellNumber(file);
    return number === undefined ? undefined : this.#cells.get(number);
  }
}

function extensionOf(file: string): TS.Extension {
  return file.endsWith(".d.ts") ? ts.Extension.Dts : ts.Extension.Ts;
}

/** The places of an installation with the given root, for a notebook in `cwd`. */
export function placesOf(root: string, cwd: string, confined = false): Places {
  const library = join(root, "dist", "lib", "index.d.ts");
  const typeRoots = typeRootsFrom(root);
  const places = { cwd, library, typeRoots };
  if (!confined) return places;
  const folders = [
    dirname(library),
    dirname(ts.sys.getExecutingFilePath()),
    ...typeRoots.map((types) => dirname(types)),
  ];
  return { ...places, onlyIn: folders.map((folder) => ts.sys.realpath?.(folder) ?? folder) };
}

/** `node_modules/@types` of a folder and of those above it. */
function typeRootsFrom(folder: string): string[] {
  const roots: string[] = [];
  for (let up = folder; ; up = dirname(up)) {
    const candidate = join(up, "node_modules", "@types");
    if (existsSync(candidate)) roots.push(candidate);
    if (dirname(up) === up) return roots;
  }
}
