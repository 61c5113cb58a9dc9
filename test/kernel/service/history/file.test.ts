import { spawnSync } from "node:child_process";
import { mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterAll, expect, it } from "vitest";
import { createHistoryFile, historyFolder } from "../../../../kernel/service/history/file.ts";
import { openHistory } from "../../../../kernel/service/history/store.ts";
import { kernelModule } from "../../../../kernel/service/install/kernelspec.ts";
import { build } from "../../process.ts";

const dist = (name: string) => path.join(path.dirname(kernelModule), "history", name);
const base = mkdtempSync(path.join(tmpdir(), "halfperiod history "));
afterAll(() => rmSync(base, { recursive: true }));
const fresh = () => path.join(mkdtempSync(path.join(base, "home ")), "halfperiod", "history");
const inputs = (history: { entries(): readonly { session: number; line: number; input: string }[] }) =>
  history.entries().map(({ session, line, input }) => `${session}/${line} ${input}`);

async function session(folder: string, ...cells: string[]) {
  const history = await openHistory(createHistoryFile(folder));
  cells.forEach((input, at) => void history.add(at + 1, input));
  return history;
}

it("the next session finds what the last one entered, and counts up — oracle: what was entered", async () => {
  const folder = fresh();
  const first = await session(folder, "E = 1", "a\nb\u2028 😀 \ud800");
  expect(first.session).toBe(1);
  await first.close();
  const second = await session(folder, "later");
  expect(second.session).toBe(2);
  expect(inputs(second)).toEqual(["1/1 E = 1", "1/2 a\nb\u2028 😀 \ud800", "2/1 later"]);
  await second.close();
});

it("folder and files are for this user only — oracle: the mode bits", async () => {
  const folder = fresh();
  await (await session(folder, "secret")).close();
  expect(statSync(folder).mode & 0o777).toBe(0o700);
  for (const name of readdirSync(folder)) expect(statSync(path.join(folder, name)).mode & 0o777).toBe(0o600);
});

it("ten kernels at once have ten numbers and lose nothing — oracle: what was entered", async () => {
  const folder = fresh();
  const histories = await Promise.all(Array.from({ length: 10 }, (_, n) => session(folder, `a${n}`, `b${n}`)));
  expect(new Set(histories.map(({ session }) => session)).size).toBe(10);
  await Promise.all(histories.map((history) => history.close()));
  const after = await session(folder);
  expect(
    after
      .entries()
      .map(({ input }) => input)
      .sort(),
  ).toEqual(
    Array.from({ length: 10 }, (_, n) => [`a${n}`, `b${n}`])
      .flat()
      .sort(),
  );
  await after.close();
});

it("a session in which nothing was entered leaves no file — oracle: the folder", async () => {
  const folder = fresh();
  await (await session(folder)).close();
  expect(readdirSync(folder)).toEqual([]);
});

it("lines that are cut off or foreign are passed over — oracle: the lines put in", async () => {
  const folder = fresh();
  await (await session(folder, "good")).close();
  const file = path.join(folder, "1.jsonl");
  const good = readFileSync(file, "utf8");
  writeFileSync(file, `[1,"cut\n${good}\0\n{}\n[1]\n["x","y"]\nnull\n[2,"also good"]\n[3,"torn`);
  writeFileSync(path.join(folder, "notes.txt"), "[1,2]");
  const next = await session(folder);
  expect(inputs(next)).toEqual(["1/1 good", "1/2 also good"]);
  await next.close();
});

it("an unusable folder is no failure: the session has its own history — oracle: a file in the way", async () => {
  const folder = path.join(base, "file");
  writeFileSync(folder, "");
  const history = await session(path.join(folder, "x"), "here");
  expect(inputs(history)).toEqual(["1/1 here"]);
  await history.close();
});

it("a disk that takes no more is no failure, and says so once — oracle: a limit of 1 KiB a file", async () => {
  await build();
  const folder = fresh();
  const code = `
    const { createHistoryFile } = await import(${JSON.stringify(dist("file.js"))});
    const { openHistory } = await import(${JSON.stringify(dist("store.js"))});
    const history = await openHistory(createHistoryFile(${JSON.stringify(folder)}));
    for (let line = 1; line <= 20; line += 1) history.add(line, "x".repeat(100));
    await history.close();
    process.stdout.write(String(history.entries().length));`;
  const limited = 'trap "" XFSZ; ulimit -f 1; exec "$0" --input-type=module -e "$1"';
  const { stdout, stderr } = spawnSync("bash", ["-c", limited, process.execPath, code], { encoding: "utf8" });
  expect(stdout, stderr).toBe("20");
  expect(stderr).toMatch(/^halfperiod: the history cannot be kept \(EFBIG\).*\n$/);
  const next = await session(folder);
  expect(next.entries().length).toBeGreaterThan(5);
  expect(next.entries().length).toBeLessThan(10);
  await next.close();
}, 120_000);

it.each([
  [{}, "linux", "/home/u/.local/state/halfperiod/history"],
  [{ XDG_STATE_HOME: "/s" }, "linux", "/s/halfperiod/history"],
  [{}, "darwin", "/home/u/Library/Application Support/halfperiod/history"],
  [{ HALFPERIOD_HISTORY: "/mine" }, "linux", "/mine"],
  [{ HALFPERIOD_HISTORY: "off" }, "linux", undefined],
] as const)("%j on %s: %s — oracle: the systems' rules for state", (env, platform, folder) => {
  expect(historyFolder(env, platform, "/home/u")).toBe(folder);
});
