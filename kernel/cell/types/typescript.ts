// The compiler. Loaded by require: an ESM import would first lex its nine megabytes for export names.
import { createRequire } from "node:module";
import type TS from "typescript";

export type { TS };
export const ts: typeof TS = createRequire(import.meta.url)("typescript");
