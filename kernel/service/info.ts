// What the kernel says of itself: the answer to kernel_info, and the facts that the kernelspec shares with it.
import { readFileSync } from "node:fs";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { PROTOCOL_VERSION } from "../wire/codec.ts";
import type { Json } from "../wire/message.ts";

export const KERNEL_NAME = "halfperiod";
export const LANGUAGE = "typescript";

/** Folder of package.json: this file lives in kernel/service, and after the build in dist/kernel/service. */
export const packageRoot = (() => {
  const above = path.resolve(path.dirname(fileURLToPath(import.meta.url)), "../..");
  return path.basename(above) === "dist" ? path.dirname(above) : above;
})();

interface Manifest {
  readonly version: string;
  readonly dependencies: { readonly typescript: string };
}

let manifest: Manifest | undefined;

function readManifest(): Manifest {
  manifest ??= JSON.parse(readFileSync(path.join(packageRoot, "package.json"), "utf8")) as Manifest;
  return manifest;
}

export const packageVersion = (): string => readManifest().version;

/** Content of kernel_info_reply, the same on shell and control. */
export function kernelInfo(): Json {
  const { version, dependencies } = readManifest();
  return {
    status: "ok",
    protocol_version: PROTOCOL_VERSION,
    implementation: KERNEL_NAME,
    implementation_version: version,
    language_info: languageInfo(dependencies.typescript),
    banner: `halfperiod ${version}: cubic curves, period lattices and elliptic functions in TypeScript, with proved digits.`,
    help_links: HELP_LINKS,
    supported_features: [],
    debugger: false,
  };
}

/** Kept in every notebook, so it is small and does not change without need. */
function languageInfo(version: string): Json {
  return {
    name: LANGUAGE,
    version,
    mimetype: "text/typescript",
    file_extension: ".ts",
    pygments_lexer: "typescript",
    codemirror_mode: { name: "javascript", typescript: true },
    nbconvert_exporter: "script",
  };
}

const HELP_LINKS = [
  { text: "Weierstrass elliptic functions (DLMF 23)", url: "https://dlmf.nist.gov/23" },
  { text: "Theta functions (DLMF 20)", url: "https://dlmf.nist.gov/20" },
  { text: "Jacobian elliptic functions (DLMF 22)", url: "https://dlmf.nist.gov/22" },
  { text: "TypeScript handbook", url: "https://www.typescriptlang.org/docs/handbook/intro.html" },
];
