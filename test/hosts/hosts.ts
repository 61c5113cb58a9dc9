// What the host tests share: Debian's front ends, a private place where they find the kernel and keep their files.
import { spawn, spawnSync } from "node:child_process";
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";

export const root = fileURLToPath(new URL("../../", import.meta.url));
/** Debian's own Python: the one that its packages install into. */
export const PYTHON = "/usr/bin/python3";
export const CHROMIUM = "/usr/bin/chromium";
/** Pictures and pages for a person to look at; not in the repository. */
export const artefacts = path.join(root, ".artefacts");
mkdirSync(artefacts, { recursive: true });

/** A program or Python module that a test needs, and the Debian package that brings it. */
export interface Need {
  readonly program?: string;
  readonly module?: string;
  readonly debianPackage: string;
}

/**
 * Which of the needs are missing, as the reason to skip a test; "" if none. Where CI is set a missing one is an error,
 * so that no host is left out unnoticed.
 */
export function missing(...needs: readonly Need[]): string {
  const absent = needs.filter((need) => !isThere(need)).map((need) => need.debianPackage);
  if (absent.length === 0) return "";
  const reason = `not installed: ${absent.join(", ")} (apt-get install ${absent.join(" ")})`;
  if (process.env.CI) throw new Error(reason);
  return reason;
}

function isThere({ program, module }: Need): boolean {
  if (program) return existsSync(program);
  return spawnSync(PYTHON, ["-c", `import ${module}`]).status === 0;
}

export interface HostPlace {
  readonly folder: string;
  /** Environment in which hosts find the kernel and keep everything else to themselves. */
  readonly env: NodeJS.ProcessEnv;
  remove(): void;
}

/** Installs the kernel, by its own command, into a fresh folder that only these hosts look into. */
export function makePlace(): HostPlace {
  const folder = mkdtempSync(path.join(os.tmpdir(), "halfperiod-hosts-"));
  const at = (name: string) => path.join(folder, name);
  const installed = spawnSync(
    process.execPath,
    [path.join(root, "kernel/bin/halfperiod.mjs"), "install", "--at", folder],
    {
      encoding: "utf8",
    },
  );
  if (installed.status !== 0) throw new Error(`halfperiod install failed:\n${installed.stdout}${installed.stderr}`);
  const env = {
    ...process.env,
    JUPYTER_PATH: folder,
    JUPYTER_CONFIG_DIR: at("config"),
    JUPYTER_DATA_DIR: at("data"),
    JUPYTER_RUNTIME_DIR: at("runtime"),
    JUPYTER_NO_CONFIG: "1",
    IPYTHONDIR: at("ipython"),
    HALFPERIOD_HISTORY: at("history"),
    PYTHONWARNINGS: "ignore",
  };
  return { folder, env, remove: () => rmSync(folder, { recursive: true, force: true }) };
}

/** Runs a program to its end and gives what it printed; throws with its stderr if it fails. */
export async function run(
  program: string,
  args: readonly string[],
  env: NodeJS.ProcessEnv,
  cwd = root,
): Promise<string> {
  const child = spawn(program, args, { env, cwd, stdio: ["ignore", "pipe", "pipe"] });
  let [out, err] = ["", ""];
  child.stdout.setEncoding("utf8").on("data", (text) => {
    out += text;
  });
  child.stderr.setEncoding("utf8").on("data", (text) => {
    err += text;
  });
  const code = await new Promise((resolve) => child.on("close", resolve));
  if (code !== 0) throw new Error(`${program} ${args.join(" ")} ended with ${code}\n${out}${err}`.slice(-6000));
  return out;
}

/** Process ids of all descendants of a process, from /proc. */
export function descendants(pid: number): number[] {
  const file = `/proc/${pid}/task/${pid}/children`;
  if (!existsSync(file)) return [];
  const children = readFileSync(file, "utf8").trim().split(/\s+/).filter(Boolean).map(Number);
  return children.flatMap((child) => [child, ...descendants(child)]);
}
