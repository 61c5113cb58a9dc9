// Any JavaScript value as text: bounded in depth, length and count; runs no getter and calls no method of the value,
// so looking at a value never changes it.

export interface PlainLimits {
  readonly depth: number;
  readonly items: number;
  readonly string: number;
  readonly total: number;
}

const LIMITS: PlainLimits = { depth: 4, items: 100, string: 2000, total: 20_000 };

/** How a library value that sits inside an array or a record is shown; undefined: as any other object. */
export type Inner = (value: object) => string | undefined;

/**
 * Text of any value. Never throws: what cannot be looked at (a revoked proxy, say) is shown as such.
 *
 * Numbers that are not whole are named for what they are, since none of their digits is proved.
 */
export function plainText(value: unknown, inner: Inner = () => undefined, limits: PlainLimits = LIMITS): string {
  if (typeof value === "string") return quoted(value, limits.total);
  return new Writer(inner, limits).whole(value);
}

class Writer {
  readonly #inner: Inner;
  readonly #limits: PlainLimits;
  readonly #path: object[] = [];
  #left: number;
  #doubles = 0;

  constructor(inner: Inner, limits: PlainLimits) {
    this.#inner = inner;
    this.#limits = limits;
    this.#left = limits.total;
  }

  whole(value: unknown): string {
    const text = this.#write(value, 0);
    const cut = text.length > this.#limits.total ? `${text.slice(0, this.#limits.total)} ...` : text;
    return this.#doubles === 0 ? cut : `${cut}   (${this.#doubles === 1 ? "a double" : "doubles"}, not proved)`;
  }

  #write(value: unknown, depth: number): string {
    const text = this.#one(value, depth);
    this.#left -= text.length;
    return text;
  }

  #one(value: unknown, depth: number): string {
    switch (typeof value) {
      case "string":
        return quoted(value, this.#limits.string);
      case "bigint":
        return `${value}n`;
      case "number":
        if (Number.isFinite(value) && !Number.isInteger(value)) this.#doubles++;
        return Object.is(value, -0) ? "-0" : String(value);
      case "symbol":
        return value.toString();
      case "function":
        return this.#function(value);
      case "object":
        return value === null ? "null" : this.#object(value, depth);
      default:
        return String(value);
    }
  }

  #function(value: object): string {
    try {
      return this.#inner(value) ?? functionText(value);
    } catch {
      return "a function that cannot be looked at";
    }
  }

  #object(value: object, depth: number): string {
    if (this.#path.includes(value)) return "[the same object again]";
    try {
      const known = this.#inner(value);
      if (known !== undefined) return known;
      this.#path.push(value);
      return this.#byKind(value, depth);
    } catch {
      return "[an object that cannot be looked at]";
    } finally {
      if (this.#path[this.#path.length - 1] === value) this.#path.pop();
    }
  }

  #byKind(value: object, depth: number): string {
    if (value instanceof Error) return errorText(value);
    if (value instanceof Promise) return "a promise; write await in front to see its value";
    if (value instanceof RegExp) return RegExp.prototype.toString.call(value);
    if (value instanceof Date) return dateText(value);
    if (depth >= this.#limits.depth) return Array.isArray(value) ? "[...]" : "{...}";
    if (Array.isArray(value)) return this.#list(value, depth);
    if (ArrayBuffer.isView(value) && !(value instanceof DataView)) return this.#view(value, depth);
    if (value instanceof Map) return this.#map(value, depth);
    if (value instanceof Set) return this.#set(value, depth);
    return this.#record(value, depth);
  }

  #list(value: readonly unknown[], depth: number): string {
    const matrix = matrixText(value);
    if (matrix !== undefined) return matrix;
    const shown = Math.min(value.length, this.#limits.items);
    const parts: string[] = [];
    for (let k = 0; k < shown && this.#left > 0; k++) parts.push(this.#property(value, String(k), depth) ?? "(empty)");
    return `[${this.#joined(parts, value.length)}]`;
  }

  #view(value: ArrayBufferView, depth: number): string {
    const list = Array.prototype.slice.call(value, 0, this.#limits.items) as unknown[];
    const length = (value as unknown as ArrayLike<unknown>).length;
    const parts = list.map((item) => this.#write(item, depth + 1));
    return `${className(value) ?? "array"} [${this.#joined(parts, length)}]`;
  }

  #map(value: ReadonlyMap<unknown, unknown>, depth: number): string {
    const parts: string[] = [];
    for (const [key, item] of Map.prototype.entries.call(value)) {
      if (parts.length >= this.#limits.items || this.#left <= 0) break;
      parts.push(`${this.#write(key, depth + 1)} → ${this.#write(item, depth + 1)}`);
    }
    return `Map {${this.#joined(parts, value.size)}}`;
  }

  #set(value: ReadonlySet<unknown>, depth: number): string {
    const parts: string[] = [];
    for (const item of Set.prototype.values.call(value)) {
      if (parts.length >= this.#limits.items || this.#left <= 0) break;
      parts.push(this.#write(item, depth + 1));
    }
    return `Set {${this.#joined(parts, value.size)}}`;
  }

  #record(value: object, depth: number): string {
    const keys = Object.keys(value);
    const parts: string[] = [];
    for (const key of keys.slice(0, this.#limits.items)) {
      if (this.#left <= 0) break;
      parts.push(
        `${/^[\p{L}_$][\p{L}\p{N}_$]*$/u.test(key) ? key : quoted(key, 80)}: ${this.#property(value, key, depth)}`,
      );
    }
    const name = className(value);
    // Parts of several lines stand in lines of their own.
    if (parts.some((part) => part.includes("\n")) && (name === undefined || name === "Object")) return inLines(parts);
    const body = parts.length === 0 ? "{}" : `{ ${this.#joined(parts, keys.length)} }`;
    return name === undefined || name === "Object" ? body : `${name} ${body}`;
  }

  /** The value of a property without running its getter. */
  #property(holder: object, key: string, depth: number): string | undefined {
    const found = Object.getOwnPropertyDescriptor(holder, key);
    if (!found) return undefined;
    return "value" in found ? this.#write(found.value, depth + 1) : "(computed when read)";
  }

  #joined(parts: readonly string[], count: number): string {
    const rest = count - parts.length;
    return [...parts, ...(rest > 0 ? [`... ${rest} more`] : [])].join(", ");
  }
}

/** A short matrix of bigints, written without the n of a literal: [[0, -1], [1, 0]]. */
function matrixText(value: readonly unknown[]): string | undefined {
  if (value.length === 0 || value.length > 12) return undefined;
  const rows = Array.from(value, (_, k) => Object.getOwnPropertyDescriptor(value, k)?.value as unknown);
  const width = Array.isArray(rows[0]) ? rows[0].length : 0;
  const whole = rows.every(
    (row) =>
      Array.isArray(row) && row.length === width && width <= 12 && row.every((entry) => typeof entry === "bigint"),
  );
  if (!whole || width === 0) return undefined;
  return `[${(rows as bigint[][]).map((row) => `[${row.join(", ")}]`).join(", ")}]`;
}

/** "name: value", one a line, what goes on in further lines moved in. */
function inLines(parts: readonly string[]): string {
  return parts.map((part) => part.replace(/\n/g, "\n  ")).join("\n");
}

function quoted(text: string, limit: number): string {
  const cut = text.length > limit ? `${text.slice(0, limit)}` : text;
  const rest = text.length - cut.length;
  return `${JSON.stringify(cut)}${rest > 0 ? ` ... ${rest} more characters` : ""}`;
}

/** Name of the class of an object, from its prototype, without running code of the object. */
function className(value: object): string | undefined {
  const prototype: unknown = Object.getPrototypeOf(value);
  if (typeof prototype !== "object" || prototype === null) return undefined;
  const maker = Object.getOwnPropertyDescriptor(prototype, "constructor")?.value as unknown;
  const name = typeof maker === "function" ? Object.getOwnPropertyDescriptor(maker, "name")?.value : undefined;
  return typeof name === "string" ? name : undefined;
}

function functionText(value: object): string {
  const name: unknown = Object.getOwnPropertyDescriptor(value, "name")?.value;
  const source = Function.prototype.toString.call(value);
  const kind = source.startsWith("class") ? "class" : "function";
  return typeof name === "string" && name !== "" ? `${kind} ${name}` : `a ${kind} without a name`;
}

function errorText(value: Error): string {
  const part = (key: string): string | undefined => {
    const own = Object.getOwnPropertyDescriptor(value, key)?.value as unknown;
    return typeof own === "string" ? own : undefined;
  };
  return `${part("name") ?? className(value) ?? "Error"}: ${part("message") ?? ""}`;
}

function dateText(value: Date): string {
  const time = Date.prototype.getTime.call(value);
  return Number.isNaN(time) ? "an invalid date" : new Date(time).toISOString();
}
