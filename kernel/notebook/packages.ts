// What the cells of a notebook import besides the library: packages by version and content, files beside the notebook by
// content. Found in the text of the cells; nothing of theirs is run.
import { createHash } from "node:crypto";
import { readdirSync, readFileSync, statSync } from "node:fs";
import { isBuiltin } from "node:module";
import path from "node:path";
import { isCode, type Notebook } from "./format.ts";

export interface Imported {
  /** Absent for a file. */
  readonly version?: string;
  /** SHA-256 of the content. */
  readonly hash: string;
}

export type Packages = Readonly<Record<string, Imported>>;

const SPECIFIER =
  /(?:\bfrom\s*|\bimport\s*\(\s*|\bimport\s+|\brequire\s*\(\s*)(?:"([^"\n]+)"|'([^'\n]+)'|`([^`$\n]+)`)/g;
/** Packages with more bytes than this are told by their package.json and main file alone. */
const LARGEST = 50_000_000;

/** Names of the packages and files that the code cells import, sorted. */
export function importedNames(notebook: Notebook): string[] {
  const names = new Set<string>();
  for (const cell of notebook.cells.filter(isCode)) {
    const source = cell.source.replace(/\/\*[\s\S]*?\*\/|^\s*\/\/.*$/gm, "");
    for (const [, double, single, plain] of source.matchAll(SPECIFIER)) {
      const name = double ?? single ?? plain ?? "";
      if (isFile(name)) names.add(name);
      else if (!isBuiltin(name) && name !== "halfperiod" && !name.includes(":")) names.add(packageName(name));
    }
  }
  return [...names].sort();
}

function isFile(name: string): boolean {
  return /^\.{0,2}\//.test(name);
}

/** `@scope/name/part` is of the package `@scope/name`. */
function packageName(specifier: string): string {
  return specifier.split("/", specifier.startsWith("@") ? 2 : 1).join("/");
}

/** Version and content of what a notebook in a folder imports; what is not found is left out. */
export function importedPackages(notebook: Notebook, folder: string): Packages {
  const entries = importedNames(notebook).flatMap((name): [string, Imported][] => {
    try {
      const found = isFile(name) ? { hash: digest([path.resolve(folder, name)]) } : installed(name, folder);
      return found ? [[name, found]] : [];
    } catch {
      return [];
    }
  });
  return Object.fromEntries(entries);
}

/** The package as Node finds it: in the nearest node_modules on the way up. */
function installed(name: string, folder: string): Imported | undefined {
  for (let up = path.resolve(folder); ; up = path.dirname(up)) {
    const place = path.join(up, "node_modules", name);
    const manifest = path.join(place, "package.json");
    if (statSync(manifest, { throwIfNoEntry: false })) {
      const { version, main = "index.js" } = JSON.parse(readFileSync(manifest, "utf8")) as Record<string, unknown>;
      const files = filesOf(place) ?? [manifest, path.join(place, String(main))];
      return { version: String(version ?? ""), hash: digest(files, place) };
    }
    if (path.dirname(up) === up) return undefined;
  }
}

/** Files of a package without those of packages inside it; undefined if they are too many bytes. */
function filesOf(place: string): string[] | undefined {
  const files = readdirSync(place, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => path.join(entry.parentPath ?? entry.path, entry.name))
    .filter((file) => !path.relative(place, file).split(path.sep).includes("node_modules"));
  const bytes = files.reduce((sum, file) => sum + statSync(file).size, 0);
  return bytes > LARGEST ? undefined : files.sort();
}

function digest(files: readonly string[], root = ""): string {
  const hash = createHash("sha256");
  for (const file of files) {
    hash.update(root === "" ? "" : path.relative(root, file).split(path.sep).join("/"));
    hash.update("\0").update(readFileSync(file)).update("\0");
  }
  return `sha256:${hash.digest("hex")}`;
}

/** What differs between the imports then and now, in words. */
export function packageChanges(then: Packages, now: Packages): string[] {
  const names = [...new Set([...Object.keys(then), ...Object.keys(now)])].sort();
  return names.flatMap((name): string[] => {
    const [before, after] = [then[name], now[name]];
    if (!before) return [`${name}: not imported or not found then`];
    if (!after) return [`${name}${before.version ? ` ${before.version}` : ""}: not found now`];
    if (before.version !== after.version) return [`${name}: ${before.version} then, ${after.version} now`];
    return before.hash === after.hash
      ? []
      : [`${name}: other content${after.version ? ` under version ${after.version}` : ""}`];
  });
}
