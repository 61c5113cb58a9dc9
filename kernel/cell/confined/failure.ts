// What a confined cell threw, as its error: the message, and the places in cells by the stack's own text.
import { plainText } from "../../../lib/page/plain.ts";
import { codeFrame } from "../codeframe.ts";
import type { ErrorReport } from "../port.ts";
import { type SourceMapData, userPosition } from "../types/sourcemap.ts";

/** A cell that has run, as its places are told. */
export interface PlacedScript {
  readonly count: number;
  readonly code: string;
  readonly map: SourceMapData;
  readonly prefix: string;
}

const MOST_PLACES = 12;
const OUTSIDE =
  /^(?:process|require|module|exports|Buffer|fetch|WebSocket|URL|setImmediate|structuredClone|crypto|performance|__dirname|__filename|WebAssembly|SharedArrayBuffer|Atomics|TextEncoder|TextDecoder|AbortController) is not defined$/;

/** Report of anything that can be thrown. */
export function failureIn(thrown: unknown, scripts: ReadonlyMap<number, PlacedScript>): ErrorReport {
  try {
    if (!(thrown instanceof Error)) return report("Thrown", typeof thrown === "string" ? thrown : plainText(thrown));
    return errorReport(thrown, scripts);
  } catch {
    return report("Thrown", "a value that throws when it is looked at");
  }
}

function errorReport(error: Error, scripts: ReadonlyMap<number, PlacedScript>): ErrorReport {
  const name = String(error.name || "Error");
  const said = demangled(String(error.message));
  const hint = OUTSIDE.test(said) ? " (a confined cell has the language and the library, nothing of the machine)" : "";
  return report(name, `${said}${hint}`, places(String(error.stack), scripts));
}

function report(ename: string, evalue: string, lines: readonly string[] = []): ErrorReport {
  return { ename, evalue, traceback: [`\u001b[31m${ename}\u001b[0m: ${evalue}`, ...lines] };
}

/** The user's names for boxes: `(0 , $f.v)` is f. */
function demangled(message: string): string {
  return message
    .replace(/\(0\s*,\s*\$+([\p{ID_Continue}$]+)\.v\)/gu, "$1")
    .replace(/\$+([\p{ID_Start}_][\p{ID_Continue}$]*)\.[vc]\b/gu, "$1");
}

function places(stack: string, scripts: ReadonlyMap<number, PlacedScript>): string[] {
  const lines: string[] = [];
  let shown = false;
  for (const [, cell, line, column] of [...stack.matchAll(/\bcell:(\d+):(\d+):(\d+)/g)].slice(0, MOST_PLACES)) {
    const script = scripts.get(Number(cell));
    const at = script && userPosition(script.map, Number(line), Number(column));
    if (!script || !at) continue;
    lines.push(`  in cell ${script.count}, line ${at.line}, column ${at.column}`);
    if (!shown) lines.push(...codeFrame(script.code, at));
    shown = true;
  }
  return lines;
}
