// Which conventions a number rests on: read off the record of how it was built.

import { isNode } from "../number/origin.ts";
import { type ConventionKey, conventionOrder } from "../proof/conventions.ts";

/** Rows that the result of an operation needs beside it, by the name of the operation. */
const ROWS: Readonly<Record<string, readonly ConventionKey[]>> = {};

/** A record longer than this is not read to its end: the rows of the last operations matter most. */
const MOST_STEPS = 2000;

export function numberConventions(x: unknown): readonly ConventionKey[] {
  const found = new Set<ConventionKey>();
  const seen = new Set<unknown>();
  const open: unknown[] = [x];
  while (open.length > 0 && seen.size < MOST_STEPS) {
    const node = open.pop();
    if (!isNode(node) || seen.has(node) || !node.origin) continue;
    seen.add(node);
    for (const key of ROWS[node.origin.operation.name] ?? []) found.add(key);
    open.push(...node.origin.operands);
  }
  return conventionOrder(found);
}
