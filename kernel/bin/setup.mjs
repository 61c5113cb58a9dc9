// Set-up that every command of a fresh clone goes through: packages from the lock file, then the build.
// Plain JavaScript, because nothing is installed or built when it runs.
import { spawnSync } from "node:child_process";
import {
  existsSync,
  lstatSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  utimesSync,
  writeFileSync,
} from "node:fs";
import { createRequire } from "node:module";
import path from "node:path";
import { fileURLToPath } from "node:url";

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), "../..");
const at = (...parts) => path.join(root, ...parts);
const age = (file) => (existsSync(file) ? statSync(file).mtimeMs : 0);

function newest(folder) {
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .reduce((latest, entry) => Math.max(latest, age(path.join(entry.parentPath ?? entry.path, entry.name))), 0);
}

/** Packages by place in node_modules, with their versions, as a lock file tells them. */
function packagesOf(lockFile) {
  try {
    return JSON.parse(readFileSync(lockFile, "utf8")).packages ?? {};
  } catch {
    return {};
  }
}

/** Is every package of the lock file there, in its version? (Optional ones are for other platforms.) */
function isInstalled() {
  const installed = packagesOf(at("node_modules", ".package-lock.json"));
  return Object.entries(packagesOf(at("package-lock.json"))).every(
    ([place, { version, optional }]) => place === "" || optional || installed[place]?.version === version,
  );
}

/** `npm ci` through a link would empty the folder that others use. */
function refuseLinkedFolder() {
  if (!lstatSync(at("node_modules"), { throwIfNoEntry: false })?.isSymbolicLink()) return;
  process.stderr.write(
    "halfperiod: node_modules is a link and its packages do not fit; install them where it points to\n",
  );
  process.exit(1);
}

/** Runs a program; its own words are shown only if it fails. */
function run(command, args, why) {
  process.stderr.write(`halfperiod: ${why}\n`);
  const shell = process.platform === "win32";
  const { status, error, stdout, stderr } = spawnSync(command, args, { cwd: root, encoding: "utf8", shell });
  if (error || status !== 0) {
    process.stderr.write(`${stdout ?? ""}${stderr ?? ""}`);
    process.stderr.write(`halfperiod: ${command} ${args.join(" ")} failed${error ? ` (${error.message})` : ""}\n`);
    process.exit(1);
  }
}

/** Installs the packages of the lock file if one is missing or of another version, and builds if a source is newer. */
export function setUp() {
  const sourcesHere = existsSync(at("lib", "index.ts"));
  if (!sourcesHere) return; // an installed package ships its build
  if (!isInstalled()) {
    refuseLinkedFolder();
    run("npm", ["ci", "--no-audit", "--no-fund"], "installing packages from the lock file");
  }
  const built = age(at("dist", ".tsbuildinfo"));
  const sources = Math.max(newest(at("lib")), newest(at("kernel")), age(at("tsconfig.json")));
  if (built < sources) {
    const tsc = createRequire(at("package.json")).resolve("typescript/bin/tsc");
    run(process.execPath, [tsc, "-p", "tsconfig.json"], "building");
    utimesSync(at("dist", ".tsbuildinfo"), new Date(), new Date()); // the compiler leaves it alone if nothing changed
  }
  const confined = at("dist", "confined", "cells.cjs");
  if (age(confined) < age(at("dist", ".tsbuildinfo"))) {
    run(process.execPath, [at("dist", "kernel", "cell", "confined", "build.js")], "preparing confined runs");
  }
  prepareStart();
}

/** Makes what a start is quicker by: bundles, and for this Node a snapshot and code caches. All works without, only later. */
function prepareStart() {
  const built = age(at("dist", ".tsbuildinfo"));
  const done = at("dist", "cache", `ready-${process.version}-${process.platform}-${process.arch}`);
  if (age(done) >= built) return;
  if (age(at("dist", "start", "types.cjs")) < built) {
    run(process.execPath, [at("kernel", "bin", "bundle.mjs")], "putting the modules of each process into one file");
  }
  mkdirSync(at("dist", "cache"), { recursive: true });
  for (const name of readdirSync(at("dist", "cache")))
    if (age(at("dist", "cache", name)) < built) rmSync(at("dist", "cache", name));
  run(process.execPath, [at("kernel", "bin", "prepare.mjs")], "preparing the start of the kernel");
  writeFileSync(done, "");
}

if (process.argv[1] && path.resolve(process.argv[1]) === fileURLToPath(import.meta.url)) setUp();
