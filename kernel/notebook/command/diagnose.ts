// `halfperiod diagnose`: does the kernel work here, do the front ends find it, and what to do if not.
import { readdir } from "node:fs/promises";
import os from "node:os";
import { setTimeout as sleep } from "node:timers/promises";
import { historyFolder } from "../../service/history/file.ts";
import { packageVersion } from "../../service/info.ts";
import { thisMachine } from "../../service/install/folders.ts";
import { kernelEntry } from "../../service/install/kernelspec.ts";
import { type FoundKernel, type SearchedFolder, survey } from "../../service/install/survey.ts";
import { type Execution, KernelClient } from "../client.ts";
import { type Console, EXIT, readArguments } from "./console.ts";
import { USAGE } from "./usage.ts";

/** A line of the report: what was looked at, what was found. */
type Fact = readonly [string, string];

interface Trial {
  readonly facts: readonly Fact[];
  readonly advice: readonly string[];
}

/** Looks, tries the kernel, and says what to do. Exit status 0 if there is nothing to do. */
export async function diagnoseCommand(args: readonly string[], { out }: Console): Promise<number> {
  readArguments(args, {}, USAGE.diagnose);
  const folders = survey(thisMachine());
  section(out, `halfperiod ${packageVersion()} on Node ${process.versions.node}, ${os.platform()} ${os.arch()}`, [
    ["node", process.execPath],
    ["kernel", kernelEntry],
    ["history", await historyFact()],
  ]);
  section(out, "Folders in which notebook front ends look for kernels", folders.map(folderFact));
  const { facts, advice } = await trial();
  section(out, "Trial of the kernel", facts);
  const steps = [...advice, ...installAdvice(folders)];
  section(out, "What to do", steps.length > 0 ? steps.map((step): Fact => ["-", step]) : [["-", "nothing: it works"]]);
  return steps.length > 0 ? EXIT.failed : EXIT.ok;
}

function section(out: Console["out"], title: string, facts: readonly Fact[]): void {
  const width = Math.max(...facts.map(([name]) => name.length));
  out.write(`${title}\n${facts.map(([name, text]) => `  ${name.padEnd(width)}  ${text}\n`).join("")}\n`);
}

async function historyFact(): Promise<string> {
  const folder = historyFolder(process.env, process.platform);
  if (folder === undefined) return "not kept (HALFPERIOD_HISTORY=off)";
  const sessions = await readdir(folder).catch(() => []);
  return `${folder}, sessions: ${sessions.length}`;
}

function folderFact({ data, exists, kernels }: SearchedFolder): Fact {
  if (!exists) return [data, "no such folder"];
  if (kernels.length === 0) return [data, "there, without halfperiod"];
  return [data, kernels.map(kernelWords).join("; ")];
}

function kernelWords({ folder, missing, hiddenBy }: FoundKernel): string {
  return `${folder}${missing ? `, broken: no ${missing}` : ""}${hiddenBy ? `, hidden by ${hiddenBy}` : ""}`;
}

function installAdvice(folders: readonly SearchedFolder[]): string[] {
  const found = folders.flatMap(({ kernels }) => kernels);
  if (found.length === 0) return ["halfperiod install: no front end of this user knows the kernel yet"];
  const repairs = found.flatMap(({ folder, repair, missing }) => (missing ? [`${repair}: repairs ${folder}`] : []));
  if (found.some(({ hiddenBy }) => hiddenBy === undefined)) return repairs;
  const foreign = found.map(({ folder, hiddenBy }) => `front ends find ${hiddenBy} before ${folder}`);
  return [...repairs, `${foreign.join("; ")}: halfperiod install --name NAME gives ours another name`];
}

/** Starts the real kernel and uses it once, timing each step. */
async function trial(): Promise<Trial> {
  const facts: Fact[] = [];
  const timed = async <T>(name: string, act: () => Promise<T>): Promise<T> => {
    const began = performance.now();
    try {
      const value = await act();
      facts.push([name, `${Math.round(performance.now() - began)} ms`]);
      return value;
    } catch (error) {
      facts.push([name, `failed: ${error instanceof Error ? error.message : error}`]);
      throw error;
    }
  };
  let client: KernelClient | undefined;
  try {
    const started = await timed("starts and answers", () => KernelClient.start({ cwd: os.tmpdir() }));
    client = started;
    await timed("first cell, checked and run", () => expectValue(started, "const two: number = 1 + 1; two", "2"));
    await timed("next cell", () => expectValue(started, "two + 1", "3"));
    facts.push(["way to stop any code", await stopWay(started)]);
    const endless = endlessTimer(started);
    await sleep(200);
    await timed("stops an endless timer", () => stop(started, endless));
    await timed("variables are kept", () => expectValue(started, "two", "2"));
    await timed("ends by itself", () => endInOrder(started));
    return { facts, advice: [] };
  } catch {
    await client?.shutdown();
    return { facts, advice: [TRIAL_ADVICE] };
  }
}

const TRIAL_ADVICE =
  "npm ci && npm run build in the folder of halfperiod, then diagnose again; if a step still fails, report the lines above";

async function expectValue(client: KernelClient, code: string, expected: string): Promise<void> {
  let shown: unknown;
  const { reply } = await client.execute(code, {
    limit: 60_000,
    onMessage: (type, content) => {
      if (type === "execute_result") shown = (content.data as Record<string, unknown>)["text/plain"];
    },
  });
  if (shown !== expected) throw new Error(`${code} gave ${shown ?? `${reply.ename}: ${reply.evalue}`}`);
}

const STOP_WAYS: Readonly<Record<string, string>> = {
  binding: "whole (by a binding of this Node)",
  internals: "whole (by internals of this Node)",
  none: "whole but for code that runs under an async hook of its own, where the session is ended",
};

/** How the cells' process clears what Node keeps of interrupted callbacks; it differs between versions of Node. */
async function stopWay(client: KernelClient): Promise<string> {
  let shown = "";
  await client.execute("String((globalThis as Record<string, any>).__cells?.rung)", {
    limit: 60_000,
    onMessage: (type, content) => {
      if (type === "execute_result") shown = String((content.data as Record<string, unknown>)["text/plain"]);
    },
  });
  const rung = shown.replaceAll('"', "");
  return STOP_WAYS[rung] ?? "not known";
}

// A loop in a timer is the hardest to stop: it has no await, and the cell that started it waits elsewhere.
function endlessTimer(client: KernelClient): Promise<Execution> {
  return client.execute("await new Promise(() => setTimeout(() => { for (;;); }, 1))", { limit: 60_000 });
}

async function stop(client: KernelClient, running: Promise<Execution>): Promise<void> {
  await client.interrupt();
  const { reply } = await running;
  if (reply.status !== "error") throw new Error("the interrupt had no effect");
}

async function endInOrder(client: KernelClient): Promise<void> {
  if (!(await client.shutdown())) throw new Error("it had to be ended by force");
}
