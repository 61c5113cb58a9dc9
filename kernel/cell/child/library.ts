// The library as the cells see it.
import * as names from "../../../lib/index.ts";
import { fixDigits } from "../../../lib/number/context.ts";
import { bundle } from "../../../lib/page/bundle.ts";
import type { Bundler } from "./value.ts";

// Whoever starts the kernel may ask for other digits than the notebook's author.
const digits = process.env.HALFPERIOD_DIGITS;
if (digits !== undefined && /^[1-9]\d{0,5}$/.test(digits)) fixDigits(Number(digits));

/** The exported values of the library. */
export const library: Readonly<Record<string, unknown>> = names;

/** The library's way to show values. */
export const bundler: Bundler = bundle;
