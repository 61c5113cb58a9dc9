// What real and complex values have in common: how they were born, and what they rest on.
import type { Birth } from "./birth.ts";
import { type Enclosure, type Exact, measuredInputs, type Node, type NumberStanding, type Origin } from "./origin.ts";

export abstract class Value implements Node {
  abstract readonly enclosure: Enclosure;
  /** The record of how the value was built, if it has one. */
  readonly origin: Origin | undefined;
  // Shared between the many values of a chain, which is why the rest is read from it.
  private readonly birth: Birth;

  protected constructor(birth: Birth, origin: Origin | undefined) {
    this.birth = birth;
    this.origin = origin;
  }

  /** The exact value, if it is known. */
  get exact(): Exact | undefined {
    return this.birth.exact;
  }

  get standing(): NumberStanding {
    return this.birth.standing;
  }

  /** The text of a measured input. */
  get source(): string | undefined {
    return this.birth.source;
  }

  /** Whether the record of how it was built is gone, because the chain was too deep. */
  get dropped(): boolean {
    return this.birth.dropped === true;
  }

  /** Digits that a display shows, if not those of the context. */
  get asked(): number | undefined {
    return this.birth.asked;
  }

  /** The measured inputs behind the value, as they were written. */
  get inputs(): readonly string[] {
    return measuredInputs(this);
  }
}
