// Set-up that every command of a fresh clone goes through: packages from the lock file, then the build.
// Plain JavaScript, because nothing is installed or built when it runs.
import { spawnSync } from "node:child_process";
import { existsSync, readdirSync, statSync } from "node:fs";
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

function run(command, args, why) {
  process.stderr.write(`halfperiod: ${why}\n`);
  const shell = process.platform === "win32";
  const { status, error } = spawnSync(command, args, { cwd: root, stdio: ["ignore", 2, 2], shell });
  if (error || status !== 0) {
    process.stderr.write(`halfperiod: ${command} ${args.join(" ")} failed${error ? ` (${error.message})` : ""}\n`);
    process.exit(1);
  }
}

/** Installs the packages of the lock file if they are missing or older than it, and builds if a source is newer. */
export function setUp() {
  const sourcesHere = existsSync(at("lib", "index.ts"));
  if (!sourcesHere) return; // an installed package ships its build
  if (age(at("node_modules", ".package-lock.json")) < age(at("package-lock.json"))) {
    run("npm", ["ci", "--no-audit", "--no-fund"], "installing packages from the lock file");
  }
  const built = age(at("dist", ".tsbuildinfo"));
  const sources = Math.max(newest(at("lib")), newest(at("kernel")), age(at("tsconfig.json")));
  if (built < sources) {
    const tsc = createRequire(at("package.json")).resolve("typescript/bin/tsc");
    run(process.execPath, [tsc, "-p", "tsconfig.json"], "building");
  }
}

if (process.argv[1] && path.resolve(process.argv[1]) === fileURLToPath(import.meta.url)) setUp();
