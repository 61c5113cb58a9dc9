// Words behind `halfperiod install` and `halfperiod remove`.
import path from "node:path";
import { parseArgs } from "node:util";
import { KERNEL_NAME } from "../info.ts";
import { InstallError } from "./errors.ts";
import { type Machine, sharedDataFolder, userDataFolder } from "./folders.ts";

export interface InstallOptions {
  /** Folder of the kernelspec. */
  readonly target: string;
  /** For all users of the machine, so everybody has to be able to read it. */
  readonly everyone: boolean;
  /** Environment that hosts give the kernel. */
  readonly env: Readonly<Record<string, string>>;
}

export const INSTALL_USAGE = `halfperiod install [--at DIR | --everyone] [--name NAME] [--set VARIABLE=VALUE]...
    makes the kernel known to the notebook front ends of this user, or repairs it after Node has moved
    --at DIR              in DIR/kernels instead, such as the data folder of a Python environment
    --everyone            for all users of this machine
    --name NAME           under another name than ${KERNEL_NAME}
    --set VARIABLE=VALUE  with this variable in the kernel's environment; may be repeated;
                          a repair keeps those set before`;

export const REMOVE_USAGE = `halfperiod remove [--at DIR | --everyone] [--name NAME]
    takes the kernel away from where install put it`;

/** Reads the words of either verb. Throws InstallError with what is wrong and the usage. */
export function readOptions(verb: "install" | "remove", args: readonly string[], machine: Machine): InstallOptions {
  const usage = verb === "install" ? INSTALL_USAGE : REMOVE_USAGE;
  const fault = (given: string, expected = "one of the forms below") =>
    new InstallError({ subject: verb, given, expected, hint: `\n${usage}` });
  const { at, everyone = false, name = KERNEL_NAME, set = [] } = parse(args, fault);
  if (at === "") throw fault('--at ""', "--at DIR");
  if (at !== undefined && everyone) throw fault("both --at and --everyone", "one of them");
  if (verb === "remove" && set.length > 0) throw fault("--set", "no environment");
  if (!/^[A-Za-z0-9._-]+$/.test(name) || /^\.+$/.test(name)) {
    throw fault(`the name ${JSON.stringify(name)}`, "ASCII letters, digits, and - . _");
  }
  const data = path.resolve(everyone ? sharedDataFolder(machine) : (at ?? userDataFolder(machine)));
  const env = Object.fromEntries(set.map((text) => variable(text, fault)));
  return { target: path.join(data, "kernels", name), everyone, env };
}

function parse(args: readonly string[], fault: (given: string) => InstallError) {
  try {
    const options = {
      at: { type: "string" },
      everyone: { type: "boolean" },
      name: { type: "string" },
      set: { type: "string", multiple: true },
    } as const;
    return parseArgs({ args: [...args], options, strict: true, allowPositionals: false }).values;
  } catch (error) {
    throw fault((error as Error).message.split(". ")[0] ?? "unknown words");
  }
}

function variable(text: string, fault: (given: string, expected: string) => InstallError): [string, string] {
  const at = text.indexOf("=");
  if (at < 1) throw fault(`--set ${text}`, "VARIABLE=VALUE");
  return [text.slice(0, at), text.slice(at + 1)];
}
