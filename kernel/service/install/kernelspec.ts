// The kernelspec: the folder by which a front end knows the kernel and starts it.
import { existsSync, readFileSync } from "node:fs";
import path from "node:path";
import { CERTIFICATES_ASIDE } from "../../cell/certificates.ts";
import { KERNEL_NAME, LANGUAGE, packageRoot, packageVersion } from "../info.ts";

export interface Kernelspec {
  readonly argv: readonly string[];
  readonly display_name: string;
  readonly language: string;
  readonly interrupt_mode: "message";
  readonly env: Readonly<Record<string, string>>;
  readonly metadata: Readonly<Record<string, unknown>>;
}

/** The file that a host starts. */
export const kernelEntry = path.join(packageRoot, "kernel", "bin", "kernel.cjs");

/** The file behind it, made by the build. */
export const kernelModule = path.join(packageRoot, "dist", "kernel", "service", "main.js");

const LOGOS = ["logo-32x32.png", "logo-64x64.png", "logo-svg.svg"];

/**
 * Content of kernel.json. The optional kernel_protocol_version is left out: jupyter_client 7.4.9 warns of every key that it
 * does not know, as of an error to come, and below 5.6 nobody reads it.
 * Paths are absolute: hosts run with another PATH than a shell. The mark in `metadata` is how
 * `remove` knows what it may take away.
 */
export function kernelspec(env: Readonly<Record<string, string>>): Kernelspec {
  return {
    argv: [process.execPath, kernelEntry, "-f", "{connection_file}"],
    display_name: "halfperiod (TypeScript)",
    language: LANGUAGE,
    interrupt_mode: "message",
    env: { ...CERTIFICATES_ASIDE, ...env },
    metadata: {
      debugger: false,
      supported_encryption: ["curve"],
      [KERNEL_NAME]: { installer: true, version: packageVersion() },
    },
  };
}

/** All files of the folder, by name. */
export function kernelspecFiles(env: Readonly<Record<string, string>>): ReadonlyMap<string, Buffer> {
  const logo = (name: string) => readFileSync(path.join(packageRoot, "kernel", "service", "logo", name));
  return new Map([
    ["kernel.json", Buffer.from(`${JSON.stringify(kernelspec(env), null, 2)}\n`)],
    ...LOGOS.map((name): [string, Buffer] => [name, logo(name)]),
  ]);
}

export const kernelspecNames: readonly string[] = ["kernel.json", ...LOGOS];

/** The kernel.json of a folder, undefined if there is none that can be read. */
export function readKernelspec(folder: string): Partial<Kernelspec> | undefined {
  try {
    const spec: unknown = JSON.parse(readFileSync(path.join(folder, "kernel.json"), "utf8"));
    return typeof spec === "object" && spec !== null ? spec : undefined;
  } catch {
    return undefined;
  }
}

/** True if the folder was made by the installer. */
export function isOurs(folder: string): boolean {
  const mark = readKernelspec(folder)?.metadata?.[KERNEL_NAME];
  return typeof mark === "object" && mark !== null && (mark as Record<string, unknown>).installer === true;
}

/** What of the paths in a kernel.json is no longer there, undefined if all is. */
export function missingPath({ argv = [] }: Partial<Kernelspec>): string | undefined {
  return argv.slice(0, 2).find((file) => path.isAbsolute(file) && !existsSync(file));
}
