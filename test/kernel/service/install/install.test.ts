import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterAll, afterEach, beforeAll, beforeEach, expect, it, vi } from "vitest";
import { searchedDataFolders, sharedDataFolder, userDataFolder } from "../../../../kernel/service/install/folders.ts";
import { install, remove } from "../../../../kernel/service/install/install.ts";
import { build } from "../../process.ts";

beforeAll(build, 600_000);

const base = mkdtempSync(path.join(tmpdir(), "halfperiod install "));
afterAll(() => rmSync(base, { recursive: true }));

let printed = "";
beforeEach(() => {
  printed = "";
  const take = (text: unknown) => {
    printed += String(text);
    return true;
  };
  vi.spyOn(process.stdout, "write").mockImplementation(take);
  vi.spyOn(process.stderr, "write").mockImplementation(take);
});
afterEach(() => void vi.restoreAllMocks());

const fresh = () => mkdtempSync(path.join(base, "data é "));
const folder = (data: string) => path.join(data, "kernels", "halfperiod");
/** Keeps the certificates of a site from the processes that have no use for them. */
// biome-ignore lint/suspicious/noTemplateCurlyInString: hosts fill in placeholders of this form
const ASIDE = { NODE_EXTRA_CA_CERTS: "", HALFPERIOD_CERTIFICATES: "${NODE_EXTRA_CA_CERTS}" };
const spec = (data: string) => JSON.parse(readFileSync(path.join(folder(data), "kernel.json"), "utf8"));

it("writes a kernelspec that hosts take: these keys and no others — oracle: schema of kernelspecs", () => {
  const data = fresh();
  expect(install(["--at", data])).toBe(0);
  expect(printed).toContain(folder(data));
  const { argv, ...rest } = spec(data);
  expect(rest).toEqual({
    display_name: expect.stringMatching(/halfperiod/),
    language: "typescript",
    interrupt_mode: "message",
    env: ASIDE,
    metadata: expect.objectContaining({ halfperiod: expect.anything() }),
  });
  for (const file of argv.slice(0, 2)) expect(path.isAbsolute(file) && existsSync(file)).toBe(true);
  expect(argv.slice(-2)).toEqual(["-f", "{connection_file}"]);
});

it("has logos of the sizes that their names say — oracle: the PNG headers", () => {
  const data = fresh();
  install(["--at", data]);
  for (const size of [32, 64]) {
    const png = readFileSync(path.join(folder(data), `logo-${size}x${size}.png`));
    expect(png.subarray(1, 4).toString()).toBe("PNG");
    expect([png.readUInt32BE(16), png.readUInt32BE(20)]).toEqual([size, size]);
  }
  expect(readFileSync(path.join(folder(data), "logo-svg.svg"), "utf8")).toMatch(/^<svg [^>]*viewBox="0 0 64 64"/);
});

it("running again repairs, keeps the variables, and leaves nothing else behind — oracle: the folder", () => {
  const data = fresh();
  install(["--at", data, "--set", "A=1=2", "--set", "B="]);
  const file = path.join(folder(data), "kernel.json");
  writeFileSync(file, JSON.stringify({ ...spec(data), argv: ["/gone/node", "/gone/main.js"] }));
  expect(install(["--at", data, "--set", "B=3"])).toBe(0);
  expect(spec(data).argv[0]).toBe(process.execPath);
  expect(spec(data).env).toEqual({ ...ASIDE, A: "1=2", B: "3" });
  expect(readdirSync(path.join(data, "kernels"))).toEqual(["halfperiod"]);
});

it("removes what it made, and says so when there is nothing — oracle: the folder", () => {
  const data = fresh();
  install(["--at", data]);
  expect(remove(["--at", data])).toBe(0);
  expect(readdirSync(path.join(data, "kernels"))).toEqual([]);
  expect(remove(["--at", data])).toBe(1);
  expect(printed).toContain("nothing is installed");
});

it("touches neither a folder of others nor a link — oracle: the files put there", () => {
  const data = fresh();
  mkdirSync(folder(data), { recursive: true });
  writeFileSync(path.join(folder(data), "kernel.json"), '{"argv":["x"],"display_name":"mine","language":"y"}');
  expect(install(["--at", data])).toBe(1);
  expect(remove(["--at", data])).toBe(1);
  expect(spec(data).display_name).toBe("mine");
  const linked = fresh();
  const real = fresh();
  install(["--at", real]);
  mkdirSync(path.join(linked, "kernels"));
  symlinkSync(folder(real), folder(linked));
  expect(install(["--at", linked])).toBe(1);
  expect(remove(["--at", linked])).toBe(1);
  expect(existsSync(path.join(folder(real), "kernel.json"))).toBe(true);
});

it("leaves a file that somebody added — oracle: the file put there", () => {
  const data = fresh();
  install(["--at", data]);
  writeFileSync(path.join(folder(data), "notes.txt"), "mine");
  expect(install(["--at", data])).toBe(1);
  expect(remove(["--at", data])).toBe(0);
  expect(readdirSync(folder(data))).toEqual(["notes.txt"]);
});

it("takes another name, and refuses one that hosts refuse — oracle: the rule for names", () => {
  const data = fresh();
  expect(install(["--at", data, "--name", "half.period-2_x"])).toBe(0);
  expect(readdirSync(path.join(data, "kernels"))).toEqual(["half.period-2_x"]);
  for (const name of ["a/b", "..", "", "é", "a b"]) expect(install(["--at", data, "--name", name])).toBe(1);
});

it.each([[["--what"]], [["x"]], [["--at"]], [["--at", ""]], [["--set", "=1"]], [["--at", "d", "--everyone"]]])(
  "words %j: status 1 and the usage — oracle: the fault put in",
  (args) => {
    expect(install(args)).toBe(1);
    expect(printed).toMatch(/^halfperiod: install: .*expected/);
    expect(printed).toContain("halfperiod install [--at DIR");
  },
);

it("a place that cannot be written to is one clear line — oracle: a file in the way", () => {
  const file = path.join(fresh(), "file");
  writeFileSync(file, "");
  expect(install(["--at", file])).toBe(1);
  expect(printed).toMatch(/cannot be written \((ENOTDIR|EEXIST)\); expected a folder that you may write to/);
});

it("a file in the way of what is to be removed: nothing is installed — oracle: the file stays", () => {
  const file = path.join(fresh(), "file");
  writeFileSync(file, "mine");
  expect(remove(["--at", file])).toBe(1);
  expect(printed).toContain("nothing is installed in");
  expect(readFileSync(file, "utf8")).toBe("mine");
});

it("an empty folder of that name is taken, and is nothing to remove — oracle: the folder", () => {
  const data = fresh();
  mkdirSync(folder(data), { recursive: true });
  expect(remove(["--at", data])).toBe(1);
  expect(printed).toContain("nothing is installed in");
  expect(install(["--at", data])).toBe(0);
  expect(spec(data).language).toBe("typescript");
});

it("a relative place is told whole — oracle: the working folder", () => {
  const place = path.relative(process.cwd(), fresh());
  for (const tell of [() => install(["--at", place]), () => remove(["--at", place])]) {
    printed = "";
    expect(tell()).toBe(0);
    expect(printed).toContain(path.resolve(place, "kernels"));
  }
  vi.stubEnv("JUPYTER_DATA_DIR", place);
  printed = "";
  expect(install([])).toBe(0);
  vi.unstubAllEnvs();
  expect(printed).toContain(path.resolve(place, "kernels"));
});

it.each([
  ["linux", {}, "/home/u/.local/share/jupyter"],
  ["linux", { XDG_DATA_HOME: "/x" }, "/x/jupyter"],
  ["linux", { XDG_DATA_HOME: "/x", JUPYTER_DATA_DIR: "/j" }, "/j"],
  ["darwin", {}, "/home/u/Library/Jupyter"],
  ["darwin", { JUPYTER_PLATFORM_DIRS: "1" }, "/home/u/Library/Application Support/Jupyter"],
  ["win32", { APPDATA: "C:\\Users\\u\\AppData\\Roaming" }, "C:\\Users\\u\\AppData\\Roaming\\jupyter"],
] as const)("%s %j: user data in %s — oracle: the hosts' documentation", (platform, env, expected) => {
  expect(userDataFolder({ platform, env, home: "/home/u" })).toBe(expected);
});

it("lists the folders hosts search, in order — oracle: the hosts' documentation", () => {
  const machine = { platform: "linux", env: { JUPYTER_PATH: "/a:/b" }, home: "/home/u" } as const;
  expect(searchedDataFolders(machine)).toEqual([
    "/a",
    "/b",
    "/home/u/.local/share/jupyter",
    "/usr/local/share/jupyter",
    "/usr/share/jupyter",
  ]);
  expect(sharedDataFolder({ platform: "win32", env: {}, home: "" })).toBe("C:\\ProgramData\\jupyter");
});
