// halfperiod check: rerun in a fresh kernel and compare with what is stored, by mathematics.
import path from "node:path";
import { type CellVerdict, compareNotebooks } from "../check/cells.ts";
import { type Finding, stands, worst } from "../check/verdict.ts";
import { executeFile } from "../execute-file.ts";
import { readNotebook, writeAtomically } from "../file.ts";
import type { Notebook } from "../format.ts";
import { changesSince, orderOfRun, readStamp, type Stamp } from "../stamp.ts";
import { type Console, EXIT, readArguments, readDigits, readLimit, UsageError } from "./console.ts";
import { USAGE } from "./usage.ts";

interface Checked {
  readonly file: string;
  readonly finding: Finding;
  readonly stands: boolean;
  /** The stamp of the stored run. */
  readonly stamp: Stamp | null;
  /** What the stamp and the counts of execution tell: edits, another order, other versions and packages. */
  readonly since: readonly string[];
  readonly cells: readonly CellVerdict[];
}

/** Checks notebooks; the files are not touched. 0 if all that is stored still stands, 1 if not. */
export async function checkCommand(args: readonly string[], { out, err }: Console): Promise<number> {
  const options = { values: ["digits", "limit", "report"], switches: ["confined"] };
  const { values, switches, positionals } = readArguments(args, options, USAGE.check);
  if (positionals.length === 0) throw new UsageError("no notebook given", USAGE.check);
  const limit = readLimit(values.limit, USAGE.check);
  const digits = readDigits(values.digits, USAGE.check);
  const all: Checked[] = [];
  for (const file of positionals) {
    const stored = await readNotebook(file);
    const { notebook } = await executeFile(file, { screen: err, limit, digits, confined: switches.confined });
    const checked = check(file, stored, notebook, digits);
    out.write(describe(checked));
    all.push(checked);
  }
  if (values.report !== undefined) await writeAtomically(values.report, `${JSON.stringify(all, undefined, 1)}\n`);
  return all.every(({ finding }) => stands(finding)) ? EXIT.ok : EXIT.failed;
}

function check(file: string, stored: Notebook, fresh: Notebook, digits: number | undefined): Checked {
  const cells = compareNotebooks(stored, fresh, digits === undefined ? {} : { digits });
  const stamp = readStamp(stored);
  const order = orderOfRun(stored);
  const since = stamp
    ? changesSince(stamp, stored, { folder: path.dirname(file), digits })
    : ["there is no stamp of a run by this program"];
  if (order !== undefined) since.push(order);
  const { finding } = worst(cells);
  return { file, finding, stands: stands(finding), stamp: stamp ?? null, since, cells };
}

const WORDS: Readonly<Record<Finding, string>> = {
  same: "same",
  "other words": "same values, other words",
  weaker: "weaker",
  differs: "differs",
  fails: "fails",
};

function describe({ file, finding, since, cells }: Checked): string {
  const noted = cells.filter((cell) => cell.finding !== "same");
  const counts = Object.keys(WORDS)
    .map((kind) => [cells.filter((cell) => cell.finding === kind).length, WORDS[kind as Finding]] as const)
    .filter(([count]) => count > 0)
    .map(([count, words]) => `${count} ${words}`);
  const lines = [
    `${file}: ${stands(finding) ? "stands" : "does not stand"} (${cells.length} cells: ${counts.join(", ")})`,
    ...since.map((note) => `  since the stored run: ${note}`),
    ...noted.flatMap((cell) => [
      `  cell ${cell.position}: ${WORDS[cell.finding]}`,
      ...cell.notes.map((n) => `    ${n}`),
    ]),
  ];
  return `${lines.join("\n")}\n`;
}
