// Puts the modules of each process of the kernel into one file, so that a start reads few files: dist/start.
// The modules of dist/ stay as they are, for whoever uses the library; the bundles are an optimisation and no more.
import { mkdirSync, mkdtempSync, readdirSync, renameSync, rmSync } from "node:fs";
import path from "node:path";
import { fileURLToPath } from "node:url";

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), "../..");
const dist = path.join(root, "dist");

/** A module keeps the place of its own file, from which it finds other files. */
const keepPlaces = {
  name: "keep-places",
  transform(code, id) {
    if (!id.startsWith(dist + path.sep) || !code.includes("import.meta.url")) return undefined;
    const place = JSON.stringify(path.relative(dist, id).split(path.sep).join("/"));
    const url = `require("node:url").pathToFileURL(require("node:path").join(__dirname, "..", ${place})).href`;
    return { code: code.replaceAll("import.meta.url", url), map: null };
  },
};

/** The snapshot of the types process starts from one script, the compiler in it; where that was installed is told later. */
const withCompiler = {
  name: "with-compiler",
  load(id) {
    if (id !== path.join(dist, "kernel/cell/types/typescript.js")) return undefined;
    return 'import ts from "typescript"; export { ts };';
  },
  transform(code, id) {
    if (!/typescript[\\/]lib[\\/]typescript\.js$/.test(id)) return undefined;
    return { code: code.replaceAll("__filename", "process.argv[3]"), map: null };
  },
};

/** ZeroMQ's own search for its addon takes longer than all the rest of it: load.cjs has kept what that found. */
const ADDON = "zeromq/lib/load-addon.js";
const addonOutside = {
  name: "addon-outside",
  load(id) {
    if (!id.split(path.sep).join("/").endsWith(`/${ADDON}`)) return undefined;
    return `module.exports = require("${ADDON}");`;
  },
};

/** Which chunk a module goes to: stack traces tell the machinery from the library by the file. */
const CHUNKS = [
  { name: "library", test: (id) => id.startsWith(path.join(dist, "lib")) || id.includes("node_modules") },
];

async function bundle(
  vite,
  outDir,
  input,
  { chunks = [], plugins = [], external = ["typescript"], minify = false } = {},
) {
  await vite.build({
    configFile: false,
    logLevel: "warn",
    root,
    publicDir: false,
    plugins: [keepPlaces, addonOutside, ...plugins],
    ssr: { noExternal: true, external: [...external, ADDON] },
    build: {
      ssr: true,
      outDir,
      emptyOutDir: false,
      target: "node20",
      minify: false,
      rolldownOptions: {
        input,
        output: {
          format: "cjs",
          entryFileNames: "[name].cjs",
          chunkFileNames: "[name].cjs",
          codeSplitting: { groups: chunks },
          minify,
        },
      },
    },
  });
}

/** Makes all bundles; those of before stay until the new ones are complete. */
async function makeBundles() {
  const vite = await import("vite");
  mkdirSync(dist, { recursive: true });
  const folder = mkdtempSync(path.join(dist, "start-"));
  try {
    await bundle(vite, folder, { kernel: path.join(dist, "kernel/service/main.js") });
    await bundle(vite, folder, { cells: path.join(dist, "kernel/cell/child/main.js") }, { chunks: CHUNKS });
    const types = { types: path.join(dist, "kernel/cell/types/snapshot-main.js") };
    // Short names make the snapshot smaller by a fifth; compressing the code would only take time.
    const minify = { compress: false, mangle: true, codegen: true };
    await bundle(vite, folder, types, { plugins: [withCompiler], external: [], minify });
    const place = path.join(dist, "start");
    mkdirSync(place, { recursive: true });
    for (const name of readdirSync(folder)) renameSync(path.join(folder, name), path.join(place, name));
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

await makeBundles();
