// Puts the kernelspec's folder in place and takes it away: whole or not at all, and never anything that is not ours.
import {
  chmodSync,
  existsSync,
  lstatSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  renameSync,
  rmdirSync,
  rmSync,
  unlinkSync,
  writeFileSync,
} from "node:fs";
import path from "node:path";
import { InstallError } from "./errors.ts";
import { isOurs, kernelspecNames } from "./kernelspec.ts";

/**
 * Writes the files into a fresh folder beside `target` and renames it into place; an earlier installation is replaced.
 * `everyone`: readable for all users.
 *
 * Throws   InstallError if something stands there that the installer did not make, or if the disk refuses.
 */
export function place(target: string, files: ReadonlyMap<string, Buffer>, everyone = false): void {
  const parent = path.dirname(target);
  let fresh: string | undefined;
  try {
    if (exists(target) && !isReplaceable(target)) throw notOurs(target, "installed over");
    mkdirSync(parent, { recursive: true });
    fresh = mkdtempSync(path.join(parent, ".halfperiod-new-"));
    const inner = path.join(fresh, "spec");
    mkdirSync(inner);
    for (const [name, bytes] of files) writeFileSync(path.join(inner, name), bytes);
    if (everyone) openForAll(inner, files.keys());
    swap(inner, target, path.join(fresh, "old"));
  } catch (error) {
    throw refused(target, "written", error);
  } finally {
    if (fresh) rmSync(fresh, { recursive: true, force: true });
  }
}

// Whatever the umask of the administrator.
function openForAll(folder: string, names: Iterable<string>): void {
  for (const name of names) chmodSync(path.join(folder, name), 0o644);
  chmodSync(folder, 0o755);
}

// The old folder is put back if the new one cannot take its place.
function swap(fresh: string, target: string, aside: string): void {
  const earlier = existsSync(target);
  if (earlier) renameSync(target, aside);
  try {
    renameSync(fresh, target);
  } catch (error) {
    if (earlier) renameSync(aside, target);
    throw error;
  }
}

/**
 * Takes an installation away. Files that somebody added stay, with their folder.
 *
 * Throws   InstallError if nothing is there, or nothing of ours, or if the disk refuses.
 */
export function takeAway(target: string): { readonly left: readonly string[] } {
  try {
    if (!exists(target) || isEmpty(target)) {
      throw new InstallError({
        subject: "remove",
        given: `nothing is installed in ${target}`,
        expected: "an installed kernel",
      });
    }
    if (lstatSync(target).isSymbolicLink() || !isOurs(target)) throw notOurs(target, "removed");
    const left = readdirSync(target).filter((name) => !kernelspecNames.includes(name));
    // kernel.json last: without it a removal that was cut off could not be taken up again
    for (const name of [...kernelspecNames].reverse()) {
      const file = path.join(target, name);
      if (exists(file)) unlinkSync(file);
    }
    if (left.length === 0) rmdirSync(target);
    return { left };
  } catch (error) {
    throw refused(target, "removed", error);
  }
}

function isReplaceable(target: string): boolean {
  if (lstatSync(target).isSymbolicLink()) return false;
  if (isEmpty(target)) return true;
  const added = () => readdirSync(target).some((name) => !kernelspecNames.includes(name));
  return isOurs(target) && !added();
}

function isEmpty(target: string): boolean {
  return lstatSync(target).isDirectory() && readdirSync(target).length === 0;
}

// A file where a folder should be on the way means the same: nothing is there.
function exists(file: string): boolean {
  try {
    return lstatSync(file, { throwIfNoEntry: false }) !== undefined;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "ENOTDIR") return false;
    throw error;
  }
}

function notOurs(target: string, verb: string): InstallError {
  return new InstallError({
    subject: target,
    given: `it holds files that "halfperiod install" did not make, so it is not ${verb}`,
    expected: "a free name, or an earlier installation",
    hint: "Move it away, or give another name with --name.",
  });
}

function refused(target: string, verb: string, error: unknown): unknown {
  const code = (error as NodeJS.ErrnoException).code;
  if (!code || error instanceof InstallError) return error;
  return new InstallError({
    subject: target,
    given: `it cannot be ${verb} (${code})`,
    expected: "a folder that you may write to",
    hint: "Choose another with --at DIR.",
  });
}
