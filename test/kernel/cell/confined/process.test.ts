// The second fence on its own: a program that is out of the realm, in the process as Node is started for confined cells.
import { spawn, spawnSync } from "node:child_process";
import { existsSync, mkdtempSync, realpathSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { confinedBundle } from "../../../../kernel/cell/confined/bundle.ts";
import { confinedFlags } from "../../../../kernel/cell/confined/flags.ts";
import { BUILT } from "../../../../kernel/cell/snapshot/file.ts";

const folder = realpathSync(mkdtempSync(join(tmpdir(), "fence-")));
const script = join(folder, "out.cjs");
const secret = join(folder, "secret.txt");
writeFileSync(secret, "secret");

/** Runs a text of Node in the fenced process; gives what it printed. */
function fenced(code: string): string {
  writeFileSync(script, `const say = (x) => require("fs").writeSync(1, String(x));\n${code}`);
  const { stdout, stderr } = spawnSync(process.execPath, [...confinedFlags(script, 512), script], {
    encoding: "utf8",
    env: {},
    cwd: "/",
  });
  return stdout + stderr;
}

describe("a program that got out of the realm", () => {
  it.each([
    ["reads no other file", `require("fs").readFileSync(${JSON.stringify(secret)}, "utf8")`],
    ["lists no folder", `require("fs").readdirSync("/")`],
    ["writes no file", `require("fs").writeFileSync(${JSON.stringify(join(folder, "made"))}, "x")`],
    ["starts no program", `require("child_process").execFileSync("/bin/true")`],
    ["starts no copy of itself", `require("child_process").fork(__filename)`],
    ["starts no worker", `new (require("worker_threads").Worker)("1", { eval: true })`],
    [
      "starts no worker with options of its own",
      `new (require("worker_threads").Worker)("1", { eval: true, execArgv: ["--allow-fs-read=*"], env: {} })`,
    ],
    ["loads no native code", `process.dlopen({ exports: {} }, "/x.node")`],
    ["opens no inspector", `require("inspector").open(0)`],
    ["has no inspector session", `new (require("inspector").Session)().connect()`],
    ["opens no database", `new (require("node:sqlite").DatabaseSync)(${JSON.stringify(secret)})`],
    ["links no file", `require("fs").symlinkSync(${JSON.stringify(secret)}, ${JSON.stringify(join(folder, "link"))})`],
  ])("%s", (_, attempt) => {
    const said = fenced(`try { say("OPEN " + ${attempt}) } catch (e) { say("closed " + e.code) }`);
    expect(said).toMatch(/^closed ERR_(?:ACCESS_DENIED|DLOPEN_DISABLED|DLOPEN_FAILED|UNKNOWN_BUILTIN_MODULE)$/);
    expect(existsSync(join(folder, "made")) || existsSync(join(folder, "link"))).toBe(false);
  });

  it("sees no environment but an empty one", () => {
    expect(fenced("say(JSON.stringify(process.env))")).toBe("{}");
  });

  it("gets no wider rights by flags that it sets itself", () => {
    const code = `try { process.execArgv.push("--allow-fs-read=*"); process.env.NODE_OPTIONS = "--allow-fs-read=*"; require("v8").setFlagsFromString("--allow-natives-syntax"); say(require("fs").readFileSync(${JSON.stringify(secret)})) } catch (e) { say(e.code) }`;
    expect(fenced(code)).toBe("ERR_ACCESS_DENIED");
  });
});

describe("a missing fence means refusal", () => {
  const start = (...flags: string[]) => {
    const child = spawnSync(process.execPath, [...flags, confinedBundle()], {
      stdio: ["ignore", "ignore", "ignore", "ignore", "pipe"],
      encoding: "utf8",
    });
    return `${child.status} ${child.output[4]}`;
  };
  it("without the realm, without the permission model, with files open", () => {
    const [realm = "", permission = "", read = ""] = confinedFlags(confinedBundle(), 512);
    expect(start(permission, read)).toContain('3 {"kind":"refused","words":"this Node has no ShadowRealm"}');
    expect(start(realm)).toContain("no permission model");
    expect(start(realm, permission, "--allow-fs-read=*")).toContain("leaves fs.read open");
  });
});

describe("the guard", () => {
  it("ends the cells when the kernel is gone — oracle: the process table", { timeout: 60_000 }, async () => {
    const guard = spawn(
      process.execPath,
      [join(BUILT, "kernel/cell/confined/guard.js"), confinedBundle(), "60000", "1024"],
      {
        stdio: ["pipe", "pipe", "inherit", "pipe", "pipe"],
      },
    );
    const reports = guard.stdio[4] as NodeJS.ReadableStream;
    await new Promise<void>((resolve) => reports.once("data", () => resolve()));
    const ended = new Promise((resolve) => reports.once("end", resolve));
    guard.stdin?.end();
    // Descriptor 4 closes when no process holds it any more: neither the guard nor the cells.
    await ended;
    expect(
      await new Promise((resolve) => (guard.exitCode === null ? guard.on("exit", resolve) : resolve(guard.exitCode))),
    ).toBe(0);
  });
});
