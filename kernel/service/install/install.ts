// `halfperiod install` and `halfperiod remove`. No Python and no other command is needed.
import { existsSync } from "node:fs";
import { packageVersion } from "../info.ts";
import { InstallError } from "./errors.ts";
import { thisMachine } from "./folders.ts";
import { isOurs, kernelModule, kernelspec, kernelspecFiles, readKernelspec } from "./kernelspec.ts";
import { readOptions } from "./options.ts";
import { place, takeAway } from "./place.ts";

/** Makes the kernel known to front ends, prints where, and gives the exit status. Running it again repairs. */
export function install(args: readonly string[]): number {
  return reporting(() => {
    const { target, env, everyone } = readOptions("install", args, thisMachine());
    if (!existsSync(kernelModule)) {
      throw new InstallError({
        subject: kernelModule,
        given: "no such file",
        expected: "the built kernel",
        hint: "Run npm run build.",
      });
    }
    place(target, kernelspecFiles({ ...earlierEnv(target), ...env }), everyone);
    return `halfperiod ${packageVersion()} is installed in ${target}\nFront ends list it as "${kernelspec({}).display_name}".`;
  });
}

/** Takes away what `install` put there, and gives the exit status. */
export function remove(args: readonly string[]): number {
  return reporting(() => {
    const { target } = readOptions("remove", args, thisMachine());
    const { left } = takeAway(target);
    const rest = left.length > 0 ? `; left there, as others made them: ${left.join(", ")}` : "";
    return `halfperiod is removed from ${target}${rest}`;
  });
}

/** Variables of an earlier installation: a repair keeps them. */
function earlierEnv(target: string): Readonly<Record<string, string>> {
  return isOurs(target) ? (readKernelspec(target)?.env ?? {}) : {};
}

function reporting(act: () => string): number {
  try {
    process.stdout.write(`${act()}\n`);
    return 0;
  } catch (error) {
    if (!(error instanceof InstallError)) throw error;
    process.stderr.write(`halfperiod: ${error.message}\n`);
    return 1;
  }
}
