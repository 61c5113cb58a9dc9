// The notebooks that come with the package: the hosts run all of them.
import { readdirSync } from "node:fs";
import path from "node:path";
import { root } from "./hosts.ts";

const folder = path.join(root, "notebooks-demo");

export const demoNotebooks: readonly string[] = readdirSync(folder)
  .filter((name) => name.endsWith(".ipynb"))
  .map((name) => path.join(folder, name));
