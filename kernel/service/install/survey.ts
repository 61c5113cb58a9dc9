// What front ends of this user find: the folders they search, and the kernelspecs of ours in them.
import { existsSync, readdirSync } from "node:fs";
import path from "node:path";
import { KERNEL_NAME } from "../info.ts";
import { type Machine, searchedDataFolders, sharedDataFolder, userDataFolder } from "./folders.ts";
import { isOurs, missingPath, readKernelspec } from "./kernelspec.ts";

export interface FoundKernel {
  readonly folder: string;
  /** What to type to have it written anew. */
  readonly repair: string;
  /** A kernel of the same name in a folder that is searched before: front ends never get to this one. */
  readonly hiddenBy: string | undefined;
  /** A path in its kernel.json that is gone: the kernel cannot start from there. */
  readonly missing: string | undefined;
}

export interface SearchedFolder {
  readonly data: string;
  readonly exists: boolean;
  readonly kernels: readonly FoundKernel[];
}

/** Looks into every data folder that front ends search, in their order. */
export function survey(machine: Machine): SearchedFolder[] {
  const searched = [...new Set(searchedDataFolders(machine).map((data) => path.resolve(data)))];
  return searched.map((data, at) => ({
    data,
    exists: existsSync(data),
    kernels: ourKernels(data, searched.slice(0, at), machine),
  }));
}

function ourKernels(data: string, before: readonly string[], machine: Machine): FoundKernel[] {
  const names = namesIn(path.join(data, "kernels"));
  return names.flatMap((name) => {
    const folder = path.join(data, "kernels", name);
    if (!isOurs(folder)) return [];
    const missing = missingPath(readKernelspec(folder) ?? {});
    return [{ folder, repair: repairOf(data, name, machine), hiddenBy: firstOf(before, name), missing }];
  });
}

/** The words that make `install` write to this folder. */
function repairOf(data: string, name: string, machine: Machine): string {
  const everyone = data === sharedDataFolder(machine) ? " --everyone" : ` --at ${JSON.stringify(data)}`;
  const place = data === path.resolve(userDataFolder(machine)) ? "" : everyone;
  return `halfperiod install${place}${name === KERNEL_NAME ? "" : ` --name ${name}`}`;
}

// Front ends compare names without case.
function firstOf(before: readonly string[], name: string): string | undefined {
  for (const data of before) {
    const kernels = path.join(data, "kernels");
    const same = namesIn(kernels).find((other) => other.toLowerCase() === name.toLowerCase());
    if (same !== undefined && existsSync(path.join(kernels, same, "kernel.json"))) return path.join(kernels, same);
  }
  return undefined;
}

function namesIn(folder: string): string[] {
  try {
    return readdirSync(folder);
  } catch {
    return []; // no such folder, or not for us to read
  }
}
