// What front ends of this user find: the folders they search, and the kernelspecs of ours in them.
import { existsSync, readdirSync } from "node:fs";
import path from "node:path";
import { type Machine, searchedDataFolders } from "./folders.ts";
import { isOurs, missingPath, readKernelspec } from "./kernelspec.ts";

export interface FoundKernel {
  readonly folder: string;
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
  return [...new Set(searchedDataFolders(machine))].map((data) => ({
    data,
    exists: existsSync(data),
    kernels: ourKernels(path.join(data, "kernels")),
  }));
}

function ourKernels(kernels: string): FoundKernel[] {
  const folders = namesIn(kernels).map((name) => path.join(kernels, name));
  return folders.filter(isOurs).map((folder) => ({ folder, missing: missingPath(readKernelspec(folder) ?? {}) }));
}

function namesIn(folder: string): string[] {
  try {
    return readdirSync(folder);
  } catch {
    return []; // no such folder, or not for us to read
  }
}
