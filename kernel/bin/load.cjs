// Starts a process of the kernel from its bundle: one file instead of some hundred, with V8's code cache.
// The bundles are made at set-up (bundle.mjs). Where there is none that fits the build, the modules start one by one:
// everything works the same, only later. Plain JavaScript, as it runs before anything is built.
"use strict";
const { mkdirSync, readFileSync, renameSync, statSync, writeFileSync } = require("node:fs");
const { createRequire, wrap } = require("node:module");
const path = require("node:path");
const { constants, Script } = require("node:vm");

const dist = path.join(__dirname, "..", "..", "dist");
const bundles = path.join(dist, "start");
const caches = path.join(dist, "cache");

const age = (file) => statSync(file, { throwIfNoEntry: false })?.mtimeMs ?? 0;

/** Something kept of an earlier run; it fits one version of Node on one architecture. */
function kept(name) {
  return path.join(caches, `${name}-${process.version}-${process.platform}-${process.arch}`);
}

/** Where the code cache of a file of the bundles is. */
function cacheOf(name) {
  return `${kept(name)}.code`;
}

const ADDON = "zeromq/lib/load-addon.js";

/** ZeroMQ's addon, from where its own search found it the last time. */
function addon(outside) {
  const place = kept("addon");
  if (age(place) === 0) return outside(ADDON);
  try {
    return { __esModule: true, default: outside(readFileSync(place, "utf8")) };
  } catch {
    return outside(ADDON);
  }
}

/** The cache, if it was made from this file; V8 itself refuses one of another version or with other flags. */
function cached(name, file) {
  const cache = cacheOf(name);
  return age(cache) >= age(file) && age(cache) > 0 ? readFileSync(cache) : undefined;
}

const scripts = new Map();
const loaded = new Map();

/** Runs a file of the bundles as a CommonJS module; files beside it are loaded in the same way. */
function run(name) {
  const known = loaded.get(name);
  if (known) return known.exports;
  const file = path.join(bundles, name);
  const module = { exports: {} };
  loaded.set(name, module);
  const script = new Script(wrap(readFileSync(file, "utf8")), {
    filename: file,
    cachedData: cached(name, file),
    importModuleDynamically: constants.USE_MAIN_CONTEXT_DEFAULT_LOADER,
  });
  scripts.set(name, script);
  const outside = createRequire(file);
  const require = (wanted) => {
    if (wanted === ADDON) return addon(outside);
    return wanted.startsWith("./") ? run(wanted.slice(2)) : outside(wanted);
  };
  script.runInThisContext().call(module.exports, module.exports, require, module, file, bundles);
  return module.exports;
}

/** Whether the bundles were made from the build that is there. */
function fits(name) {
  const made = age(path.join(bundles, name));
  return made > 0 && made >= age(path.join(dist, ".tsbuildinfo"));
}

/** Starts from the bundle `name`, or else from the built module. */
function start(name, module) {
  if (fits(`${name}.cjs`)) return run(`${name}.cjs`);
  return import(require("node:url").pathToFileURL(path.join(dist, module)).href);
}

/** Keeps what V8 has compiled so far for the next start. */
function keepCode() {
  mkdirSync(caches, { recursive: true });
  for (const [name, script] of scripts) keep(cacheOf(name), script.createCachedData());
  const place = Object.keys(require.cache).find((file) => /zeromq[\\/].*\.node$/.test(file));
  if (place !== undefined) keep(kept("addon"), place);
}

function keep(file, content) {
  const fresh = `${file}.${process.pid}`;
  writeFileSync(fresh, content);
  renameSync(fresh, file);
}

// Set-up lets a kernel run some cells and then asks both of its processes for their code (prepare.mjs).
if (process.env.HALFPERIOD_KEEP_CODE === "1") {
  process.on("exit", keepCode);
  globalThis[Symbol.for("halfperiod.keepCode")] = keepCode;
}

module.exports = { start };
