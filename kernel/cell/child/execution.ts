// `$rt` of one running cell: what the rewritten code calls.
import { Rational } from "../../../lib/number/rational.ts";
import { operators } from "../../../lib/surface/operators.ts";
import type { Box } from "./box.ts";
import type { Modules } from "./modules.ts";

/** What a run asks of the modules. */
type Importing = Pick<Modules, "meta" | "import" | "require">;

/** Rejects the awaits of an interrupted cell. */
export class Interrupted extends Error {
  override readonly name = "Interrupted";
  readonly #brand = true;

  /** Told by the brand: `instanceof` would run traps of a thrown proxy. */
  static is(thrown: unknown): thrown is Interrupted {
    return typeof thrown === "object" && thrown !== null && #brand in thrown && thrown.#brand;
  }

  constructor() {
    super("the cell was interrupted while it waited");
  }
}

/** A setter through which a destructuring declaration defines a box. */
class Target {
  readonly #execution: Execution;
  readonly #box: Box;

  constructor(execution: Execution, box: Box) {
    this.#execution = execution;
    this.#box = box;
  }

  set v(value: unknown) {
    this.#execution.def(this.#box, value);
  }
}

/** A member of an object that a compound assignment changes: its old value is read before the other operand. */
class Member {
  readonly #object: Record<PropertyKey, unknown>;
  readonly #key: PropertyKey;
  readonly #old: unknown;

  constructor(object: unknown, key: unknown) {
    this.#object = object as Record<PropertyKey, unknown>;
    this.#key = typeof key === "symbol" ? key : String(key);
    this.#old = this.#object[this.#key];
  }

  add(value: unknown): unknown {
    return this.#set(operators.add(this.#old, value));
  }

  sub(value: unknown): unknown {
    return this.#set(operators.sub(this.#old, value));
  }

  mul(value: unknown): unknown {
    return this.#set(operators.mul(this.#old, value));
  }

  div(value: unknown): unknown {
    return this.#set(operators.div(this.#old, value));
  }

  pow(value: unknown): unknown {
    return this.#set(operators.pow(this.#old, value));
  }

  #set(value: unknown): unknown {
    this.#object[this.#key] = value;
    return value;
  }
}

/** Exact literals by their text: a loop makes each once. */
const literals = new Map<string, Rational>();

/** One run of one cell. */
export class Execution {
  readonly meta: Modules["meta"];
  /** Names that this run has defined so far. */
  readonly defined = new Set<string>();
  /** Value of the last expression. */
  value: unknown = undefined;
  /** What the target of a compound assignment hangs on, between its evaluation and the reading of the old value. */
  held: unknown = undefined;
  /** True once the outcome has been reported: what still runs defines nothing. */
  closed = false;
  readonly #modules: Importing;
  readonly #waiting = new Set<(reason: unknown) => void>();
  #interrupted = false;

  constructor(modules: Importing) {
    this.#modules = modules;
    this.meta = modules.meta;
  }

  def(box: Box, value?: unknown): void {
    if (this.closed) return;
    box.v = value;
    this.defined.add(box.name);
  }

  to(box: Box): Target {
    return new Target(this, box);
  }

  /** `var x;` leaves a value that the same run has given. */
  hoist(box: Box): void {
    if (!this.defined.has(box.name)) this.def(box, undefined);
  }

  /** The operators, where an operand is or may be a library value. */
  readonly op = operators;

  into(object: unknown, key: unknown): Member {
    return new Member(object, key);
  }

  /** The exact number of a literal, "3/7". */
  rational(text: string): Rational {
    const known = literals.get(text);
    if (known) return known;
    const value = Rational.parse(text);
    literals.set(text, value);
    return value;
  }

  result(value: unknown): void {
    this.value = value;
  }

  /** A promise that settles as the given one does, and is rejected by an interrupt. */
  aw<T>(awaited: T | PromiseLike<T>): Promise<T> {
    // What an ended cell left behind goes no further.
    if (this.closed) return new Promise<T>(() => {});
    return new Promise<T>((resolve, reject) => {
      // Through the event loop: a loop that catches everything must not become a storm of promises.
      if (this.#interrupted) setImmediate(() => reject(new Interrupted()));
      this.#waiting.add(reject);
      const settled = Promise.resolve(awaited);
      settled.then(
        (value) => {
          this.#waiting.delete(reject);
          resolve(value);
        },
        (reason) => {
          this.#waiting.delete(reject);
          reject(reason);
        },
      );
    });
  }

  /** The values of `for await`, each step of which an interrupt rejects. */
  async *each<T>(values: AsyncIterable<T> | Iterable<T | PromiseLike<T>>): AsyncGenerator<T> {
    const iterator = iteratorOf(values);
    let finished = false;
    try {
      for (;;) {
        const step = await this.aw(iterator.next());
        if (step.done) {
          finished = true;
          return;
        }
        yield await this.aw(step.value);
      }
    } finally {
      if (!finished) await iterator.return?.();
    }
  }

  import(specifier: unknown, options?: object): Promise<unknown> {
    return this.#modules.import(specifier, options);
  }

  require(specifier: string): unknown {
    return this.#modules.require(specifier);
  }

  /** Rejects what the cell awaits, now and from now on. */
  interrupt(): void {
    this.#interrupted = true;
    const waiting = [...this.#waiting];
    this.#waiting.clear();
    for (const reject of waiting) reject(new Interrupted());
  }
}

function iteratorOf<T>(
  values: AsyncIterable<T> | Iterable<T | PromiseLike<T>>,
): AsyncIterator<T | PromiseLike<T>> | Iterator<T | PromiseLike<T>> {
  const asynchronous = (values as AsyncIterable<T>)[Symbol.asyncIterator];
  return asynchronous ? asynchronous.call(values) : (values as Iterable<T>)[Symbol.iterator]();
}
