// The command. Each verb lives in the folder that does the work; this file only chooses.

/** Runs `halfperiod <args>` and gives the exit code. */
export async function main(args: readonly string[]): Promise<number> {
  process.stderr.write(`halfperiod: no such command: ${args.join(" ")}\n`);
  return 2;
}
