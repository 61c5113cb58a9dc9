// What real and complex values have in common: how they were born, and what they rest on.
import { BIRTHS, type Birth, both } from "./birth.ts";
import {
  type Enclosure,
  type Exact,
  measuredInputs,
  type Node,
  type NumberStanding,
  type Operation,
  type Origin,
} from "./origin.ts";

export abstract class Value implements Node {
  abstract readonly enclosure: Enclosure;
  // Fields are declared only: to define each before the constructor sets it costs a tenth of a product.
  /** Shared between the many values of a chain, which is why the rest is read from it. */
  declare readonly born: Birth;
  // A chain of sums and products makes many records that nobody reads: theirs is kept in fields of the value until somebody does.
  declare private made: Origin | Operation | undefined;
  declare private left: Value | undefined;
  declare private right: Value | undefined;
  /** Length of the longest chain of operations below. */
  declare readonly depth: number;

  protected constructor(
    birth: Birth,
    made: Origin | Operation | undefined,
    depth: number,
    left?: Value,
    right?: Value,
  ) {
    this.born = birth;
    this.made = made;
    this.left = left;
    this.right = right;
    this.depth = depth;
  }

  /** The record of how the value was built, if it has one. */
  get origin(): Origin | undefined {
    if (this.left !== undefined) {
      this.made = { operation: this.made as Operation, operands: [this.left, this.right], depth: this.depth };
      this.left = undefined;
      this.right = undefined;
    }
    return this.made as Origin | undefined;
  }

  /** The exact value, if it is known. */
  get exact(): Exact | undefined {
    return this.born.exact;
  }

  get standing(): NumberStanding {
    return this.born.standing;
  }

  /** The text of a measured input. */
  get source(): string | undefined {
    return this.born.source;
  }

  /** Whether the record of how it was built is gone, because the chain was too deep. */
  get dropped(): boolean {
    return this.born.dropped === true;
  }

  /** Digits that a display shows, if not those of the context. */
  get asked(): number | undefined {
    return this.born.asked;
  }

  /** The measured inputs behind the value, as they were written. */
  get inputs(): readonly string[] {
    return measuredInputs(this);
  }
}

/** What a value built from both keeps; by far the most are built from defined ones. */
export function bornOf(x: Value, y: Value): Birth {
  return x.born === DEFINED && y.born === DEFINED ? DEFINED : BIRTHS[both(x.standing, y.standing)];
}

export const DEFINED = BIRTHS.defined;
