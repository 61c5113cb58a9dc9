// The notebooks that come with the package: the hosts run all of them.
import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { root } from "./hosts.ts";

const folder = path.join(root, "notebooks-demo");

export const demoNotebooks: readonly string[] = readdirSync(folder)
  .filter((name) => name.endsWith(".ipynb"))
  .map((name) => path.join(folder, name));

/** How many figures the stored outputs of a notebook have: a fresh run in any host must have as many. */
export function storedFigures(file: string): number {
  return readFileSync(file, "utf8").match(/"image\/svg\+xml":/g)?.length ?? 0;
}
