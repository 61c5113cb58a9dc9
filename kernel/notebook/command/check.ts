// halfperiod check: rerun in a fresh kernel and compare with what is stored, by mathematics.
import { type CellVerdict, compareNotebooks } from "../check/cells.ts";
import { type Finding, stands, worst } from "../check/verdict.ts";
import { executeFile } from "../execute-file.ts";
import { readNotebook, writeAtomically } from "../file.ts";
import type { Notebook } from "../format.ts";
import { changesSince, readStamp } from "../stamp.ts";
import { type Console, EXIT, readArguments, readDigits, readLimit, UsageError } from "./console.ts";
import { USAGE } from "./usage.ts";

interface Checked {
  readonly file: string;
  readonly finding: Finding;
  /** What the stamp tells: edits and other versions. */
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
  return { file, finding: worst(cells).finding, since: stamp ? changesSince(stamp, stored) : [], cells };
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
