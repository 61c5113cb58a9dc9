// halfperiod run: restart, run all, keep the outputs.
import { mkdir, stat } from "node:fs/promises";
import path from "node:path";
import { executeFile } from "../execute-file.ts";
import { writeNotebook } from "../file.ts";
import { seconds } from "../progress.ts";
import { summarise } from "../summary.ts";
import { type Console, EXIT, failedCell, readArguments, readDigits, readLimit, UsageError } from "./console.ts";
import { USAGE } from "./usage.ts";

/** Runs notebooks and writes their outputs into them, or elsewhere with --to. A run that fails writes nothing. */
export async function runCommand(args: readonly string[], { out, err }: Console): Promise<number> {
  const options = { values: ["to", "digits", "limit"], switches: ["confined"] };
  const { values, switches, positionals } = readArguments(args, options, USAGE.run);
  if (positionals.length === 0) throw new UsageError("no notebook given", USAGE.run);
  const limit = readLimit(values.limit, USAGE.run);
  const digits = readDigits(values.digits, USAGE.run);
  const targetOf = await targets(positionals, values.to);
  let code: number = EXIT.ok;
  for (const file of positionals) {
    const started = performance.now();
    const run = await executeFile(file, { screen: err, limit, digits, confined: switches.confined });
    if (run.failure) {
      err.write(failedCell(file, run.total, run.failure));
      code = EXIT.failed;
      continue;
    }
    await writeNotebook(targetOf(file), run.notebook);
    out.write(`${file}: ${run.total} cells in ${seconds(performance.now() - started)}${summarise(run.notebook)}\n`);
  }
  return code;
}

async function targets(files: readonly string[], to: string | undefined): Promise<(file: string) => string> {
  if (to === undefined) return (file) => file;
  const isFolder = await stat(to).then(
    (found) => found.isDirectory(),
    () => to.endsWith(path.sep),
  );
  if (isFolder) {
    await mkdir(to, { recursive: true });
    return (file) => path.join(to, path.basename(file));
  }
  if (files.length > 1)
    throw new UsageError(`--to ${to} is no folder, and there are ${files.length} notebooks`, USAGE.run);
  return () => to;
}
