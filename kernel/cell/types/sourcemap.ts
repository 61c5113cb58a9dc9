// Source maps of emitted cells, brought from the checked text back to the user's text.
import type { EditedText } from "./edits.ts";

const DIGITS = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
const VALUES = new Map([...DIGITS].map((digit, value) => [digit, value]));

export interface SourceMapData {
  readonly version: 3;
  readonly sources: readonly string[];
  readonly names: readonly string[];
  readonly mappings: string;
}

/** The user's position, counted from 1, of a position counted from 1 in the emitted script; undefined: machinery. */
export function userPosition(
  map: SourceMapData,
  line: number,
  column: number,
): { readonly line: number; readonly column: number } | undefined {
  let [sourceLine, sourceColumn] = [0, 0];
  let found: { line: number; column: number } | undefined;
  for (const [index, segments] of map.mappings.split(";").slice(0, line).entries()) {
    let at = 0;
    for (const segment of segments ? segments.split(",") : []) {
      const [step = 0, , lineStep, columnStep] = decode(segment);
      at += step;
      if (lineStep === undefined || columnStep === undefined) continue;
      sourceLine += lineStep;
      sourceColumn += columnStep;
      if (index === line - 1 && at <= column - 1) found = { line: sourceLine + 1, column: sourceColumn + 1 };
    }
  }
  return found;
}

/** The same map with positions of the user's text; positions behind its end are dropped. */
export function toUserMap(map: SourceMapData, edited: EditedText, user: string): SourceMapData {
  const from = new Lines(edited.text);
  const to = new Lines(user);
  let sourceLine = 0;
  let sourceColumn = 0;
  let writtenLine = 0;
  let writtenColumn = 0;
  const lines = map.mappings.split(";").map((line) => {
    let column = 0;
    let writtenAt = 0;
    const segments: string[] = [];
    for (const segment of line ? line.split(",") : []) {
      const [at = 0, , lineStep, columnStep] = decode(segment);
      column += at;
      if (lineStep === undefined || columnStep === undefined) continue;
      sourceLine += lineStep;
      sourceColumn += columnStep;
      const place = to.position(edited.toUser(from.offset(sourceLine, sourceColumn)));
      segments.push(encode([column - writtenAt, 0, place.line - writtenLine, place.column - writtenColumn]));
      writtenAt = column;
      writtenLine = place.line;
      writtenColumn = place.column;
    }
    return segments.join(",");
  });
  return { version: 3, sources: map.sources, names: [], mappings: lines.join(";") };
}

/** Offsets and zero-based positions of a text. */
class Lines {
  readonly #starts = [0];

  constructor(text: string) {
    for (let at = text.indexOf("\n"); at >= 0; at = text.indexOf("\n", at + 1)) this.#starts.push(at + 1);
  }

  offset(line: number, column: number): number {
    return (this.#starts[line] ?? 0) + column;
  }

  position(offset: number): { line: number; column: number } {
    let low = 0;
    let high = this.#starts.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((this.#starts[middle] as number) <= offset) low = middle + 1;
      else high = middle;
    }
    return { line: low - 1, column: offset - (this.#starts[low - 1] as number) };
  }
}

function decode(segment: string): number[] {
  const numbers: number[] = [];
  let value = 0;
  let shift = 0;
  for (const digit of segment) {
    const bits = VALUES.get(digit) ?? 0;
    value += (bits & 31) << shift;
    shift += 5;
    if (bits & 32) continue;
    numbers.push(value & 1 ? -(value >> 1) : value >> 1);
    value = 0;
    shift = 0;
  }
  return numbers;
}

function encode(numbers: readonly number[]): string {
  let text = "";
  for (const number of numbers) {
    let rest = number < 0 ? (-number << 1) | 1 : number << 1;
    do {
      const bits = rest & 31;
      rest >>>= 5;
      text += DIGITS[rest > 0 ? bits | 32 : bits];
    } while (rest > 0);
  }
  return text;
}
