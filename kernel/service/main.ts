// The kernel process: `node main.js -f FILE`. Loads nothing slow; the cells come after the sockets answer.
import type { CellSession, CellSessionOptions } from "../cell/port.ts";
import { readConnection } from "../wire/connection.ts";
import { handleSignals, watchParent } from "../wire/lifetime.ts";
import { log } from "../wire/log.ts";
import { createHistoryFile, historyFolder } from "./history/file.ts";
import { startKernel } from "./kernel.ts";

/** Loads the cells; with --confined among the arguments they have the language and the library alone. */
async function createCells(options: CellSessionOptions): Promise<CellSession> {
  const { createCellSession } = await import("../cell/session.ts");
  return createCellSession(process.argv.includes("--confined") ? { ...options, confined: {} } : options);
}

/** Path of the connection file in the arguments: after -f, or alone. */
function connectionFile(args: readonly string[]): string | undefined {
  const at = args.indexOf("-f");
  return at >= 0 ? args[at + 1] : args.find((argument) => !argument.startsWith("-"));
}

async function main(): Promise<number> {
  const file = connectionFile(process.argv.slice(2));
  if (file === undefined) {
    log("kernel: no connection file given; expected -f FILE. A notebook front end starts the kernel so.");
    return 2;
  }
  // Else this signal would open a debugger's port in the kernel.
  process.on("SIGUSR1", () => {});
  // A fault in the kernel itself must not take the user's variables with it.
  process.on("uncaughtException", (error) => log(`kernel: ${error?.stack ?? error}`));
  const connection = readConnection(file);
  if (connection.key === "") log("the connection has no key: whoever reaches its ports can run code here.");
  const folder = historyFolder(process.env, process.platform);
  const historyFile = folder === undefined ? {} : { historyFile: createHistoryFile(folder) };
  const kernel = await startKernel(connection, { createCells, ...historyFile });
  handleSignals({ interrupt: kernel.interrupt, end: kernel.end });
  watchParent(kernel.end);
  await kernel.ended;
  return 0;
}

main().then(
  (code) => process.exit(code),
  (error) => {
    log(error instanceof Error ? error.message : String(error));
    process.exit(1);
  },
);
