// What a value keeps besides its enclosure and origin.
import type { Exact, NumberStanding, Origin } from "./origin.ts";

export interface Birth {
  readonly exact?: Exact | undefined;
  readonly origin?: Origin | undefined;
  readonly standing: NumberStanding;
  readonly source?: string | undefined;
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

/** The standing of what is built from both: a double caps all, then a measured value; exact and defined ones give defined. */
export function both(a: NumberStanding, b: NumberStanding): NumberStanding {
  if (a === "double" || b === "double") return "double";
  return a === "measured" || b === "measured" ? "measured" : "defined";
}
