// How any value is shown, plain JavaScript values included; dispatches on the table of kinds.

import type { ConventionKey } from "../proof/conventions.ts";
import { type Decimal, parseDecimal, texInteger } from "./digits.ts";
import type { Cell, Data, Kind, Show } from "./kind.ts";
import { KINDS } from "./kinds.ts";
import { plainText } from "./plain.ts";
import { isPlainNumber } from "./plain-number.ts";
import { isRecord } from "./table.ts";
import { array, texName, texProse } from "./tex.ts";

/** The kind of a value of the library; undefined for all others. Subclasses share the kind of their class. */
export function kindOf(value: unknown): Kind<unknown> | undefined {
  if (typeof value !== "object" && typeof value !== "function") return undefined;
  if (value === null) return undefined;
  return KINDS.find(({ is }) => is(value))?.kind as Kind<unknown> | undefined;
}

/** Lists and records longer than this are shown as text. */
const MOST_PARTS = 200;

type Parts = readonly (readonly [name: string, part: unknown])[];

/** The parts of a list or a plain record that holds library values or bigints, however deep; else undefined. */
export function partsOf(value: unknown): Parts | undefined {
  const parts = structure(value, 0);
  return parts?.some(([, part]) => isTypeset(part, 0)) ? parts : undefined;
}

/** The parts of a list or a plain record of which every part can stand in a formula; else undefined. */
function structure(value: unknown, depth: number): Parts | undefined {
  if (depth > 3 || typeof value !== "object" || value === null) return undefined;
  const list = Array.isArray(value);
  if (list ? value.length > MOST_PARTS : !isRecord(value)) return undefined;
  const keys = list ? Array.from(value, (_, k) => String(k)) : Object.keys(value);
  if (keys.length > MOST_PARTS) return undefined;
  const parts = keys.map((key) => [key, ownValue(value, key)] as const);
  return parts.every(([, part]) => isShowable(part, depth)) ? parts : undefined;
}

/** A property that is a value; getters are not run. */
function ownValue(holder: object, key: string): unknown {
  return Object.getOwnPropertyDescriptor(holder, key)?.value;
}

/** Words and safe integers may stand beside values that are typeset, but are not typeset on their own. */
function isShowable(part: unknown, depth: number): boolean {
  if (["string", "boolean", "undefined", "bigint"].includes(typeof part) || Number.isSafeInteger(part)) return true;
  return kindOf(part)?.tex !== undefined || structure(part, depth + 1) !== undefined;
}

function isTypeset(part: unknown, depth: number): boolean {
  if (typeof part === "bigint" || kindOf(part)?.tex !== undefined) return true;
  return structure(part, depth + 1)?.some(([, inner]) => isTypeset(inner, depth + 1)) ?? false;
}

export const show: Show = {
  short(value, part) {
    return kindOf(value)?.short?.(value, part);
  },

  text(value) {
    const kind = kindOf(value);
    if (kind) return kind.text(value, show);
    return plainText(value, (inner) => (inner === value ? undefined : kindOf(inner)?.text(inner, show)));
  },

  tex(value) {
    const kind = kindOf(value);
    if (kind?.tex) return kind.tex(value, show);
    if (isPlainNumber(value)) return plainNumberTex(value);
    if (typeof value === "string") return texProse(value);
    const parts = structure(value, 0);
    if (parts) return Array.isArray(value) ? listTex(parts) : recordTex(parts);
    return texProse(show.text(value));
  },

  cell(value) {
    const kind = kindOf(value);
    if (kind?.cell) return kind.cell(value, show);
    if (kind?.tex) return { kind: "formula", text: kind.text(value, show), tex: kind.tex(value, show) };
    if (typeof value === "bigint" || typeof value === "number") return numberCell(value);
    if (partsOf(value)) return { kind: "formula", text: show.text(value), tex: show.tex(value) };
    return { kind: "words", text: typeof value === "string" ? value : show.text(value) };
  },

  conventions(value) {
    return conventionsOf(value);
  },

  data(value) {
    return dataOf(value, 0);
  },
};

function plainNumberTex(value: bigint | number): string {
  if (value === Number.POSITIVE_INFINITY) return "\\infty";
  return value === Number.NEGATIVE_INFINITY ? "-\\infty" : texInteger(String(value));
}

function numberCell(value: bigint | number): Cell {
  if (Math.abs(Number(value)) === Number.POSITIVE_INFINITY && typeof value === "number") {
    return { kind: "formula", text: String(value), tex: plainNumberTex(value) };
  }
  const re: Decimal | undefined = parseDecimal(String(value));
  const exact = typeof value === "bigint" || Number.isSafeInteger(value);
  return re && exact ? { kind: "number", re } : { kind: "words", text: show.text(value) };
}

function listTex(parts: readonly (readonly [string, unknown])[]): string {
  const matrix = matrixRows(parts.map(([, part]) => part));
  if (matrix)
    return `\\left( ${array(
      "r".repeat(matrix[0]?.length ?? 1),
      matrix.map((row) => row.map(show.tex)),
    )} \\right)`;
  const items = parts.map(([, part]) => show.tex(part));
  const long = items.some((item) => item.length > 60) || items.join("").length > 120;
  if (!long) return `\\left( ${items.join(",\\; ")} \\right)`;
  return `\\left( ${array(
    "l",
    items.map((item, k) => [k + 1 < items.length ? `${item},` : item]),
  )} \\right)`;
}

/** Rows of integers, all of one length: a matrix. */
function matrixRows(parts: readonly unknown[]): (readonly bigint[])[] | undefined {
  const rows = parts.filter((row): row is bigint[] => Array.isArray(row) && row.every((n) => typeof n === "bigint"));
  const width = rows[0]?.length ?? 0;
  return rows.length === parts.length && width > 0 && rows.every((row) => row.length === width) ? rows : undefined;
}

function recordTex(parts: readonly (readonly [string, unknown])[]): string {
  return array(
    "rcl",
    parts.map(([name, part]) => [texName(name), "=", show.tex(part)]),
  );
}

/** Rows of the conventions that a value, or the parts of a list or record, need. */
export function conventionsOf(value: unknown): ConventionKey[] {
  const own = kindOf(value)?.conventions?.(value, show) ?? [];
  const inner = (partsOf(value) ?? []).flatMap(([, part]) => conventionsOf(part));
  return [...new Set([...own, ...inner])];
}

function dataOf(value: unknown, depth: number): Data {
  const kind = kindOf(value);
  if (kind) return kind.data(value, show);
  if (typeof value === "bigint") return { kind: "rational", value: String(value) };
  if (typeof value === "number") {
    return Number.isSafeInteger(value)
      ? { kind: "rational", value: String(value) }
      : { kind: "double", value: String(value) };
  }
  if (typeof value === "string" || typeof value === "boolean") return value;
  if (depth < 4 && Array.isArray(value) && value.length <= MOST_PARTS)
    return value.map((part) => dataOf(part, depth + 1));
  if (depth < 4 && isRecord(value)) return recordData(value, depth);
  return null;
}

function recordData(value: object, depth: number): Data {
  const entries = Object.keys(value)
    .slice(0, MOST_PARTS)
    .map((key): [string, Data] => [key, dataOf(ownValue(value, key), depth + 1)]);
  return Object.fromEntries(entries);
}
