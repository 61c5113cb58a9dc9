// Where notebook front ends look for kernels.
import { homedir } from "node:os";
import path from "node:path";

export interface Machine {
  readonly platform: NodeJS.Platform;
  readonly env: NodeJS.ProcessEnv;
  readonly home: string;
}

export function thisMachine(): Machine {
  return { platform: process.platform, env: process.env, home: homedir() };
}

/**
 * Data folder of this user; kernels are in its subfolder `kernels`.
 *
 * Source   the front ends' documentation of their directories; JUPYTER_PLATFORM_DIRS is the newer layout.
 */
export function userDataFolder({ platform, env, home }: Machine): string {
  if (env.JUPYTER_DATA_DIR) return env.JUPYTER_DATA_DIR;
  const { join } = platform === "win32" ? path.win32 : path.posix;
  const newer = /^(1|true|yes|on)$/i.test(env.JUPYTER_PLATFORM_DIRS ?? "");
  if (platform === "darwin")
    return newer ? join(home, "Library/Application Support/Jupyter") : join(home, "Library/Jupyter");
  if (platform === "win32") {
    if (newer) return join(env.LOCALAPPDATA ?? join(home, "AppData", "Local"), "Jupyter");
    return join(env.APPDATA ?? join(home, "AppData", "Roaming"), "jupyter");
  }
  return join(env.XDG_DATA_HOME || join(home, ".local", "share"), "jupyter");
}

/** Data folder for all users of the machine. */
export function sharedDataFolder({ platform, env }: Machine): string {
  if (platform === "win32") return path.win32.join(env.PROGRAMDATA ?? "C:\\ProgramData", "jupyter");
  return "/usr/local/share/jupyter";
}

/** Data folders in which front ends search, in their order; those of a Python environment depend on the front end. */
export function searchedDataFolders(machine: Machine): string[] {
  const { platform, env } = machine;
  const listed = (env.JUPYTER_PATH ?? "").split(platform === "win32" ? ";" : ":").filter((entry) => entry !== "");
  const system = platform === "win32" ? [] : ["/usr/share/jupyter"];
  return [...listed, userDataFolder(machine), sharedDataFolder(machine), ...system];
}
