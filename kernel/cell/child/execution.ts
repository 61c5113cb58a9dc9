// `$rt` of one running cell: what the rewritten code calls.
import type { Box } from "./box.ts";
import type { Modules } from "./modules.ts";

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

/** One run of one cell. */
export class Execution {
  readonly meta: Modules["meta"];
  /** Names that this run has defined so far. */
  readonly defined = new Set<string>();
  /** Value of the last expression. */
  value: unknown = undefined;
  /** True once the outcome has been reported: what still runs defines nothing. */
  closed = false;
  readonly #modules: Modules;
  readonly #waiting = new Set<(reason: unknown) => void>();
  #interrupted = false;

  constructor(modules: Modules) {
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

  result(value: unknown): void {
    this.value = value;
  }

  /** A promise that settles as the given one does, and is rejected by an interrupt. */
  aw<T>(awaited: T | PromiseLike<T>): Promise<T> {
    return new Promise<T>((resolve, reject) => {
      if (this.#interrupted) reject(new Interrupted());
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
