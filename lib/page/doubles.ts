// Numbers that came in as doubles: none of their digits is proved beyond what the double is assumed to hold, and one line
// under an output says so. Which numbers an output shows is known when it has been written.
import { measuredInputs } from "../number/origin.ts";
import type { Complex, Real } from "../number/values.ts";

/** Inputs of the numbers shown since the last `forget`; a number whose inputs are no longer known counts as "". */
const shown = new Set<string>();

const MOST = 3;
const LARGEST_DENOMINATOR = 1000;

/** Begins a new output. */
export function forgetDoubles(): void {
  shown.clear();
}

/** Notes a number that is shown, if it rests on a double. */
export function noteDouble(x: Real | Complex): void {
  if (x.standing !== "double") return;
  const doubles = measuredInputs(x).filter((input) => !input.includes("±"));
  for (const input of doubles.length > 0 ? doubles : [""]) shown.add(input);
}

/** The line for what has been shown; undefined if no double is behind it. */
export function doublesNote(): string | undefined {
  if (shown.size === 0) return undefined;
  const known = [...shown].filter((input) => input !== "");
  const one = shown.size === 1;
  const start = one ? "from a double" : "from doubles";
  const assumed = "right to half a unit of the last place";
  if (known.length === 0) return `${start} that ${one ? "is" : "are"} assumed ${assumed}`;
  const rest = known.length - MOST;
  const list = known.slice(0, MOST).join(", ") + (rest > 0 ? ` and ${rest} more` : "");
  const exact = known.slice(0, MOST).map(exactly);
  return `${start}: ${list}, ${one ? "" : "each "}assumed ${assumed}; exact would be ${exact.join(", ")}`;
}

/** How the number that was probably meant is written: a fraction with a small denominator that rounds to the double. */
function exactly(input: string): string {
  const x = Number(input);
  for (let denominator = 1; denominator <= LARGEST_DENOMINATOR; denominator++) {
    const numerator = Math.round(x * denominator);
    if (numerator / denominator === x) return `rational(${numerator}, ${denominator})`;
  }
  return Number.isNaN(x) ? "complex(...) of exact parts" : `real("${input}")`;
}
