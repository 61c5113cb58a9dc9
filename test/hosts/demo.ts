// The notebooks that come with the package: the hosts run all of them.
import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { root } from "./hosts.ts";

const folder = path.join(root, "notebooks-demo");

const allNotebooks = readdirSync(folder)
  .filter((name) => name.endsWith(".ipynb"))
  .map((name) => path.join(folder, name));

/** The page on errors fails on purpose in some cells; what is looked at in the others would all be found wanting there. */
const failsOnPurpose = (file: string) => readFileSync(file, "utf8").includes('"raises-exception"');

export const demoNotebooks: readonly string[] = allNotebooks.filter((file) => !failsOnPurpose(file));

/** The notebooks with cells that are meant to fail. */
export const failingNotebooks: readonly string[] = allNotebooks.filter(failsOnPurpose);

/** How many figures the stored outputs of a notebook have: a fresh run in any host must have as many. */
export function storedFigures(file: string): number {
  return readFileSync(file, "utf8").match(/"image\/svg\+xml":/g)?.length ?? 0;
}
