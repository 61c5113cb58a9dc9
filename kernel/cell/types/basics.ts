// The globals of Node that most cells make do with. Node's whole types are four times as large as the library's and all
// that the language itself declares; they are read when a cell first speaks of something that only they know.
import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { type TS, ts } from "./typescript.ts";

/** Declarations in place of Node's: the same names with the same meaning, in so far as they are declared here. */
export const BASICS = `
interface Console {
  log(message?: any, ...optionalParams: any[]): void;
  info(message?: any, ...optionalParams: any[]): void;
  debug(message?: any, ...optionalParams: any[]): void;
  warn(message?: any, ...optionalParams: any[]): void;
  error(message?: any, ...optionalParams: any[]): void;
  table(tabularData: any, properties?: readonly string[]): void;
  dir(obj: any, options?: any): void;
  group(...label: any[]): void;
  groupEnd(): void;
  time(label?: string): void;
  timeEnd(label?: string): void;
  count(label?: string): void;
  assert(value: any, message?: string, ...optionalParams: any[]): void;
  trace(message?: any, ...optionalParams: any[]): void;
}
declare var console: Console;
declare namespace NodeJS {
  interface Timeout { ref(): this; unref(): this; hasRef(): boolean; refresh(): this; close(): this; [Symbol.toPrimitive](): number }
  interface Immediate { ref(): this; unref(): this; hasRef(): boolean }
  interface Process {
    readonly stdout: { write(text: string | Uint8Array): boolean };
    readonly stderr: { write(text: string | Uint8Array): boolean };
    readonly pid: number;
    readonly env: { [name: string]: string | undefined };
    exit(code?: number | string | null): never;
    abort(): never;
    kill(pid: number, signal?: string | number): true;
    chdir(directory: string): void;
    cwd(): string;
    nextTick(callback: Function, ...args: any[]): void;
    uptime(): number;
  }
}
declare var process: NodeJS.Process;
declare var performance: { now(): number };
declare function setTimeout<TArgs extends any[]>(callback: (...args: TArgs) => void, delay?: number, ...args: TArgs): NodeJS.Timeout;
declare function setTimeout(callback: (args: void) => void, delay?: number): NodeJS.Timeout;
declare function setInterval<TArgs extends any[]>(callback: (...args: TArgs) => void, delay?: number, ...args: TArgs): NodeJS.Timeout;
declare function setInterval(callback: (args: void) => void, delay?: number): NodeJS.Timeout;
declare function setImmediate<TArgs extends any[]>(callback: (...args: TArgs) => void, ...args: TArgs): NodeJS.Immediate;
declare function setImmediate(callback: (args: void) => void): NodeJS.Immediate;
declare function clearTimeout(timeout: NodeJS.Timeout | string | number | undefined): void;
declare function clearInterval(timeout: NodeJS.Timeout | string | number | undefined): void;
declare function clearImmediate(immediate: NodeJS.Immediate | undefined): void;
declare function queueMicrotask(callback: () => void): void;
`;

/** Uses of a global that the basics declare in part, and the uses that they are enough for. */
const IN_PART: Readonly<Record<string, readonly [use: RegExp, enough: RegExp]>> = {
  process: [
    /\bprocess\b/g,
    /\bprocess\.(?:(?:stdout|stderr)\.write\(|(?:exit|abort|kill|chdir|cwd|nextTick|uptime)\(|(?:pid|env)\b)/g,
  ],
  performance: [/\bperformance\b/g, /\bperformance\.now\(/g],
  console: [
    /\bconsole\b/g,
    /\bconsole\.(?:log|info|debug|warn|error|table|dir|group|groupEnd|time|timeEnd|count|assert|trace)\b/g,
  ],
};

/** Whether a text uses, of a global that is declared in part, more than that. */
export function goesBeyondBasics(code: string, words: ReadonlySet<string>): boolean {
  const count = (pattern: RegExp) => code.match(pattern)?.length ?? 0;
  return Object.entries(IN_PART).some(([name, [use, enough]]) => words.has(name) && count(use) > count(enough));
}

/** What tells that a cell needs Node's whole types. */
export interface NodeWords {
  /** Names that they make global; offered by completion. */
  readonly globals: readonly string[];
  /** The same, and names of members that they add to types of the language. */
  readonly words: ReadonlySet<string>;
}

/** Reads the words from the declarations in a folder; `language` are the types of the language by their names. */
export function readNodeWords(folder: string, language: ReadonlySet<string>): NodeWords {
  const here = globalsIn([ts.createSourceFile("basics.d.ts", BASICS, ts.ScriptTarget.ES2023)], language);
  const files = readdirSync(folder, { recursive: true, encoding: "utf8" }).filter((name) => name.endsWith(".d.ts"));
  const sources = files.map((name) =>
    ts.createSourceFile(name, readFileSync(join(folder, name), "utf8"), ts.ScriptTarget.ES2023),
  );
  const all = globalsIn(sources, language);
  const unknown = (name: string) => !here.words.has(name);
  return { globals: [...all.globals].filter(unknown), words: new Set([...all.words].filter(unknown)) };
}

function globalsIn(sources: readonly TS.SourceFile[], language: ReadonlySet<string>) {
  const globals = new Set<string>();
  const words = new Set<string>();
  const declare = (statement: TS.Statement): void => {
    if (ts.isVariableStatement(statement)) {
      for (const { name } of statement.declarationList.declarations) if (ts.isIdentifier(name)) globals.add(name.text);
    } else if (ts.isFunctionDeclaration(statement) && statement.name) globals.add(statement.name.text);
    else if (ts.isInterfaceDeclaration(statement) && language.has(statement.name.text)) {
      for (const { name } of statement.members) {
        if (name && ts.isIdentifier(name)) words.add(name.text);
        else if (name && ts.isComputedPropertyName(name) && ts.isPropertyAccessExpression(name.expression)) {
          words.add(name.expression.name.text);
        }
      }
    } else if (
      ts.isInterfaceDeclaration(statement) ||
      ts.isTypeAliasDeclaration(statement) ||
      ts.isClassDeclaration(statement)
    ) {
      if (statement.name) words.add(statement.name.text);
    } else if (ts.isModuleDeclaration(statement)) declareModule(statement);
  };
  const declareModule = (statement: TS.ModuleDeclaration): void => {
    const { name, body } = statement;
    if (ts.isIdentifier(name) && name.text !== "global") return void words.add(name.text);
    if (!body || !ts.isModuleBlock(body)) return;
    for (const inner of body.statements) {
      if (ts.isIdentifier(name)) declare(inner);
      else if (ts.isModuleDeclaration(inner) && inner.name.text === "global") declareModule(inner);
    }
  };
  for (const source of sources) {
    const script = !ts.isExternalModule(source);
    for (const statement of source.statements) {
      if (script || (ts.isModuleDeclaration(statement) && statement.name.text === "global")) declare(statement);
    }
  }
  for (const name of globals) words.add(name);
  return { globals, words };
}
