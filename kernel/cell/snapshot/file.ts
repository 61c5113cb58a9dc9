// Where the start-up snapshot of the types process is, and whether it may be used.
import { existsSync, statSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";

/** The built tree, also when this file runs from source. */
const here = import.meta.url;
const built = new URL(here.endsWith(".ts") ? "../../../dist/" : "../../../", here);

export const BUILT = fileURLToPath(built);
export const ROOT = fileURLToPath(new URL("../", built));

/** A snapshot fits one version of Node on one machine architecture. */
export const SNAPSHOT = join(BUILT, "cache", `types-${process.version}-${process.platform}-${process.arch}.blob`);

/** The snapshot, if there is one that is not older than the build it was made from. */
export function usableSnapshot(): string | undefined {
  if (!existsSync(SNAPSHOT)) return undefined;
  const stamp = join(BUILT, ".tsbuildinfo");
  if (existsSync(stamp) && statSync(stamp).mtimeMs > statSync(SNAPSHOT).mtimeMs) return undefined;
  return SNAPSHOT;
}
