// Names of a script: a notebook may declare a name anew in every cell, and a name of the library too; a script may not.

/** Gives the top-level names of cells names in the script. */
export class Names {
  /** Name in the script by name in the notebook, as it stands now. */
  readonly #current = new Map<string, string>();
  /** Names that are taken in the script. */
  readonly #taken = new Set(["typeset", "rational", "real", "operators"]);

  /** Enters a cell: what it declares, what it takes from the library. The result gives the script's name of a name. */
  enter(declared: readonly string[], library: readonly string[]): (name: string) => string {
    for (const name of library) this.#taken.add(name);
    for (const name of declared) {
      const free = this.free(name);
      this.#current.set(name, free);
      this.#taken.add(free);
    }
    return (name) => this.#current.get(name) ?? name;
  }

  /** The name itself, or with the first number behind it that makes it free. */
  free(name: string): string {
    if (!this.#taken.has(name)) return name;
    for (let count = 2; ; count++) if (!this.#taken.has(`${name}${count}`)) return `${name}${count}`;
  }
}
