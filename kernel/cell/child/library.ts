// The library as the cells see it.
import * as names from "../../../lib/index.ts";
import { bundle } from "../../../lib/page/bundle.ts";
import type { Bundler } from "./value.ts";

/** The exported values of the library. */
export const library: Readonly<Record<string, unknown>> = names;

/** The library's way to show values. */
export const bundler: Bundler = bundle;
