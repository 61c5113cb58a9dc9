// Derivations as values: numbered steps with words, formula, value, source and check.

import type { ConventionKey } from "../proof/conventions.ts";
import type { Standing } from "../proof/standing.ts";
import { Claim } from "../surface/claim-value.ts";

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
}

/** One step; its number is its place, and text can cite it as (3). */
export interface Step extends StepParts {
  readonly text: string;
}

/** A derivation. Immutable: `step` gives a longer one. */
export class Derivation {
  readonly title: string;
  readonly steps: readonly Step[];
  readonly level: Level;

  /** The rows of the conventions that the steps rest on, shown once below them. */
  readonly conventions: readonly ConventionKey[];

  constructor(
    title: string,
    steps: readonly Step[] = [],
    level: Level = "steps",
    conventions: readonly ConventionKey[] = [],
  ) {
    this.title = title;
    this.steps = steps;
    this.level = level;
    this.conventions = conventions;
  }

  /** One step more: words, which may hold $formulas$, with a formula, a value, a source and a check as there are. */
  step(text: string, parts: StepParts = {}): Derivation {
    return new Derivation(this.title, [...this.steps, { text, ...parts }], this.level, this.conventions);
  }

  /** The same derivation, shown to another depth. */
  show(level: Level): Derivation {
    return new Derivation(this.title, this.steps, level, this.conventions);
  }

  /**
   * The number of the step with a label, as "(3)", for running text.
   * Throws   RangeError with the labels that there are.
   */
  cite(label: string): string {
    const place = this.steps.findIndex((step) => step.label === label);
    if (place >= 0) return `(${place + 1})`;
    const labels = this.steps.flatMap((step) => step.label ?? []);
    throw new RangeError(
      `cite: no step has the label "${label}"; expected one of ${labels.join(", ") || "none: no step has one"}`,
    );
  }

  /** The same derivation, with the conventions that it rests on. */
  under(...conventions: readonly ConventionKey[]): Derivation {
    return new Derivation(this.title, this.steps, this.level, conventions);
  }

  /** How the checks of the steps are known; steps without a check are not counted. */
  get checks(): readonly Standing[] {
    return this.steps.flatMap(({ check }) => (check ? [check instanceof Claim ? check.standing : check] : []));
  }
}

/**
 * A derivation of one's own, to be built step by step.
 *
 * @example derivation("Doubling P").step("the tangent at P", { formula: "y = 3x", check: claim(...) })
 */
export function derivation(title: string): Derivation {
  return new Derivation(title);
}
