// The kernel on a connection file, from its start to its end. The cells come after the sockets answer.
import type { CellSession, CellSessionOptions } from "../cell/port.ts";
import { readConnection } from "../wire/connection.ts";
import { handleSignals, watchParent } from "../wire/lifetime.ts";
import { log } from "../wire/log.ts";
import { createHistoryFile, historyFolder } from "./history/file.ts";
import { startKernel } from "./kernel.ts";

/** Loads the cells; HALFPERIOD_MEMORY limits their heap, in MB; with --confined among the arguments they have the language and the library alone. */
async function createCells(options: CellSessionOptions): Promise<CellSession> {
  const { createCellSession } = await import("../cell/session.ts");
  const limit = process.env.HALFPERIOD_MEMORY ?? "";
  const limited = /^[1-9]\d{1,6}$/.test(limit) ? { ...options, memoryLimit: Number(limit) } : options;
  return createCellSession(process.argv.includes("--confined") ? { ...limited, confined: {} } : limited);
}

async function serve(file: string): Promise<void> {
  const parent = process.ppid;
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
  watchParent(parent, kernel.end);
  await kernel.ended;
}

/** Serves the connection that a file tells, until the kernel is asked to end; then the process ends. */
export function run(file: string): void {
  serve(file).then(
    () => process.exit(0),
    (error) => {
      log(error instanceof Error ? error.message : String(error));
      process.exit(1);
    },
  );
}
