// Derivations as values: numbered steps with words, formula, value, source and check.

import type { ConventionKey } from "../proof/conventions.ts";
import type { Standing } from "../proof/standing.ts";
import { Claim } from "../surface/claim-value.ts";
import { citeSource } from "./sources.ts";

/** How much of a derivation is shown: the words only, the steps with their values, or sources and checks too. */
export type Level = "outline" | "steps" | "all";

export interface StepParts {
  /** TeX, without delimiters. */
  readonly formula?: string;
  /** Any value of the library; shown with its digits. */
  readonly value?: unknown;
  /** Where the formula is taken from, such as "Silverman AEC III.2.3". */
  readonly source?: string;
  /** How the step is known: a claim, or a standing. */
  readonly check?: Claim | Standing;
  /** The other way by which the check was made, in words. */
  readonly route?: string;
  /** A name by which text can cite the step, the same however many steps stand before it. */
  readonly label?: string;
  /** True for a value that is longer the more digits are asked for, such as the rows of a mean: it is shown, and no result. */
  readonly trace?: boolean;
}

/** One step; its number is its place, and text can cite it as (3). */
export interface Step extends StepParts {
  readonly text: string;
}

interface Rest {
  readonly steps?: readonly Step[];
  readonly level?: Level;
  readonly conventions?: readonly ConventionKey[];
  readonly name?: string;
}

/** A derivation. Immutable: `step` gives a longer one. */
export class Derivation {
  readonly title: string;
  readonly steps: readonly Step[];
  readonly level: Level;
  /** The name under which links and references find it; letters, digits and hyphens. */
  readonly name: string;
  /** The rows of the conventions that the steps rest on, shown once below them. */
  readonly conventions: readonly ConventionKey[];

  constructor(title: string, { steps = [], level = "steps", conventions = [], name = slug(title) }: Rest = {}) {
    this.title = title;
    this.steps = steps;
    this.level = level;
    this.conventions = conventions;
    this.name = name;
  }

  #with(rest: Rest): Derivation {
    return new Derivation(this.title, { ...this, ...rest });
  }

  /**
   * One step more: words, which may hold $formulas$, with a formula, a value, a source and a check as there are. {label} in the words
   * stands for the number of an earlier step.
   */
  step(text: string, parts: StepParts = {}): Derivation {
    if (parts.source) citeSource(parts.source);
    return this.#with({ steps: [...this.steps, { text, ...parts }] });
  }

  /** The same derivation, shown to another depth. */
  show(level: Level): Derivation {
    return this.#with({ level });
  }

  /** The same derivation under another name, where a notebook holds several of one kind. */
  named(name: string): Derivation {
    return this.#with({ name: slug(name) });
  }

  /** The same derivation, with the conventions that it rests on. */
  under(...conventions: readonly ConventionKey[]): Derivation {
    return this.#with({ conventions });
  }

  /**
   * The number of the step with a label, as "(3)", for running text.
   * Throws   RangeError with the labels that there are.
   */
  cite(label: string): string {
    return `(${this.#place(label) + 1})`;
  }

  /**
   * Where a link finds the step: [step (3)](#step-torsion-bound) in Markdown, \ref{step-torsion-bound} in LaTeX. It does not change
   * when steps are added before it.
   */
  anchor(label: string): string {
    this.#place(label);
    return anchorOf(this, label);
  }

  /** The value of the step with a label. Throws as `cite`. */
  value(label: string): unknown {
    return this.steps[this.#place(label)]?.value;
  }

  #place(label: string): number {
    const place = this.steps.findIndex((step) => step.label === label);
    if (place >= 0) return place;
    const labels = this.steps.flatMap((step) => step.label ?? []);
    throw new RangeError(
      `cite: no step has the label "${label}"; expected one of ${labels.join(", ") || "none: no step has one"}`,
    );
  }

  /** How the checks of the steps are known; steps without a check are not counted. */
  get checks(): readonly Standing[] {
    return this.steps.flatMap(({ check }) => (check ? [check instanceof Claim ? check.standing : check] : []));
  }
}

/** The name of a step for links and references; a step without a label goes by its number. */
export function anchorOf({ name }: Derivation, label: string | number | undefined): string {
  return `step-${name}${label === undefined ? "" : `-${label}`}`;
}

/** The first words of a title, fit for an address. */
function slug(title: string): string {
  const words = title
    .replace(/\$[^$]*\$/g, " ")
    .toLowerCase()
    .match(/[\p{L}\p{N}]+/gu);
  return (words ?? ["derivation"]).slice(0, 3).join("-");
}

/**
 * A derivation of one's own, to be built step by step.
 *
 * @example derivation("Doubling P").step("the tangent at P", { formula: "y = 3x", check: claim(...), label: "tangent" })
 */
export function derivation(title: string): Derivation {
  return new Derivation(title);
}
