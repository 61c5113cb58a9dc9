// What a value keeps besides its enclosure and origin.
import type { Exact, NumberStanding, Origin } from "./origin.ts";

export interface Birth {
  readonly exact?: Exact | undefined;
  readonly origin?: Origin | undefined;
  readonly standing: NumberStanding;
  readonly source?: string | undefined;
  /** The record of a chain that was too deep is gone: the value is what it is. */
  readonly dropped?: boolean | undefined;
  /** Digits that a display shows, if not those of the context. */
  readonly asked?: number | undefined;
}

/** Shared, because a chain of operations makes many. */
export const BIRTHS: Readonly<Record<NumberStanding, Birth>> = {
  exact: { standing: "exact" },
  defined: { standing: "defined" },
  measured: { standing: "measured" },
  double: { standing: "double" },
};

/** The same for a value whose record is dropped. */
export const DROPPED: Readonly<Record<NumberStanding, Birth>> = {
  exact: { standing: "exact", dropped: true },
  defined: { standing: "defined", dropped: true },
  measured: { standing: "measured", dropped: true },
  double: { standing: "double", dropped: true },
};

/** The standing of what is built from both: a double caps all, then a measured value; exact and defined ones give defined. */
export function both(a: NumberStanding, b: NumberStanding): NumberStanding {
  if (a === "double" || b === "double") return "double";
  return a === "measured" || b === "measured" ? "measured" : "defined";
}
