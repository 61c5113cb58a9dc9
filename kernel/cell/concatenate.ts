// Many modules as one script: each in a function of its own, found by its place, loaded when it is first required.
import { readFileSync } from "node:fs";
import { createRequire, isBuiltin } from "node:module";
import { dirname, join, relative, sep } from "node:path";
import { pathToFileURL } from "node:url";
import { ts } from "./types/typescript.ts";

interface Module {
  readonly text: string;
  /** What it requires, by the words it uses. */
  readonly needs: Readonly<Record<string, string>>;
}

/**
 * A script (an expression) whose value is the exports of a built module; `root` is the folder that places are relative to.
 *
 * Modules of Node are left to the `require` around the script; a script that needs none runs anywhere.
 */
export function concatenated(entry: string, root: string): string {
  const modules = collect(entry, root);
  const parts = [...modules].map(
    ([place, { text, needs }]) =>
      `${JSON.stringify(place)}: [function (exports, require, module) {${text}\n}, ${JSON.stringify(needs)}]`,
  );
  return `(() => {
const builtin = typeof require === "function" ? require : undefined;
const definitions = {${parts.join(",\n")}};
const loaded = Object.create(null);
const load = (place) => {
  if (loaded[place]) return loaded[place].exports;
  const [define, needs] = definitions[place];
  const module = (loaded[place] = { exports: {} });
  define.call(module.exports, module.exports, (name) => (needs[name] ? load(needs[name]) : builtin(name)), module);
  return module.exports;
};
return load(${JSON.stringify(placeOf(entry, root))});
})()`;
}

function collect(entry: string, root: string): Map<string, Module> {
  const found = new Map<string, Module>();
  const visit = (file: string): string => {
    const place = placeOf(file, root);
    if (found.has(place)) return place;
    const text = asCommonJs(readFileSync(file, "utf8"));
    const needs: Record<string, string> = {};
    found.set(place, { text, needs });
    for (const [, name = ""] of text.matchAll(/\brequire\("([^"]+)"\)/g)) {
      if (!isBuiltin(name)) needs[name] = visit(resolved(name, file));
    }
    return place;
  };
  visit(entry);
  return found;
}

function asCommonJs(text: string): string {
  return ts.transpileModule(text, {
    compilerOptions: { module: ts.ModuleKind.CommonJS, target: ts.ScriptTarget.ES2022, esModuleInterop: true },
  }).outputText;
}

function resolved(name: string, from: string): string {
  return name.startsWith(".") ? join(dirname(from), name) : createRequire(pathToFileURL(from)).resolve(name);
}

function placeOf(file: string, root: string): string {
  return relative(root, file).split(sep).join("/");
}
