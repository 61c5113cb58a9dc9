// Variables of the notebook: each lives in a box, so that every cell and closure sees the same value.

/** One variable. `v` is its value; `c` is what a write to a constant is compiled to. */
export class Box {
  v: unknown = undefined;
  readonly name: string;

  constructor(name: string) {
    this.name = name;
  }

  get c(): unknown {
    return this.v;
  }

  set c(_value: unknown) {
    throw new TypeError(`Assignment to constant variable '${this.name}'.`);
  }
}

/** The boxes of a session: those of the notebook, and those filled with the library. */
export class Boxes {
  readonly #notebook = new Map<string, Box>();
  readonly #library = new Map<string, Box>();

  constructor(library: Readonly<Record<string, unknown>>) {
    for (const name of Object.keys(library)) {
      const box = new Box(name);
      box.v = library[name];
      this.#library.set(name, box);
    }
  }

  /** The box of a name; a name of the notebook gets one when it is first asked for. */
  get(name: string, origin: "notebook" | "library"): Box {
    const held = (origin === "library" ? this.#library : this.#notebook).get(name);
    if (held) return held;
    const box = new Box(name);
    this.#notebook.set(name, box);
    return box;
  }
}
