// Builds the one file of the confined cells: the program around the realm, and as a text in it the realm's own script
// with the library. `node dist/kernel/cell/confined/build.js`
import { mkdirSync, renameSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { concatenated } from "../concatenate.ts";
import { BUILT, ROOT } from "../snapshot/file.ts";
import { BUNDLE, isBundleFresh } from "./bundle.ts";

function writeBundle(): void {
  const place = (name: string) => join(BUILT, "kernel", "cell", "confined", name);
  const realm = `${concatenated(place("realm.js"), ROOT)}.start\n//# sourceURL=halfperiod`;
  const program = concatenated(place("outer.js"), ROOT);
  mkdirSync(dirname(BUNDLE), { recursive: true });
  const temporary = `${BUNDLE}.${process.pid}`;
  writeFileSync(temporary, `"use strict";\n${program}.run(${JSON.stringify(realm)});\n`);
  renameSync(temporary, BUNDLE);
}

if (!isBundleFresh()) writeBundle();
