// Fields of a request's content. They come from outside: each is checked before use, and absent ones have defaults.
import { ProtocolError } from "../wire/errors.ts";
import type { Json } from "../wire/message.ts";

/** A string that the request cannot do without. Throws ProtocolError, which becomes an error reply. */
export function requiredText(content: Json, name: string): string {
  const value = field(content, name);
  if (typeof value === "string") return value;
  const given = value === undefined ? `no "${name}"` : `"${name}" is ${kindOf(value)}`;
  throw new ProtocolError({ subject: "request", given, expected: "a string" });
}

export function optionalText(content: Json, name: string): string | undefined {
  const value = field(content, name);
  return typeof value === "string" ? value : undefined;
}

export function flag(content: Json, name: string, otherwise: boolean): boolean {
  const value = field(content, name);
  return typeof value === "boolean" ? value : otherwise;
}

export function optionalNumber(content: Json, name: string): number | undefined {
  const value = field(content, name);
  return typeof value === "number" && Number.isFinite(value) ? value : undefined;
}

/** The string entries of an object of strings; anything else is left out. */
export function textEntries(content: Json, name: string): Record<string, string> {
  const value = field(content, name);
  if (typeof value !== "object" || value === null) return {};
  return Object.fromEntries(Object.entries(value).filter((entry): entry is [string, string] => isText(entry[1])));
}

// Own properties only: "constructor" is a legal name on the wire.
function field(content: Json, name: string): unknown {
  return Object.hasOwn(content, name) ? content[name] : undefined;
}

function isText(value: unknown): value is string {
  return typeof value === "string";
}

function kindOf(value: unknown): string {
  if (value === null) return "null";
  return Array.isArray(value) ? "a list" : `of type ${typeof value}`;
}
