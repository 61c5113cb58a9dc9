// A cell that ends its process on purpose: the session says by which call.
import type { Reporter } from "./report.ts";

/** Reports calls of process.exit and process.abort before they are carried out. */
export function announceLeaving(reporter: Reporter): void {
  const { exit, abort } = process;
  const announce = (words: string) => reporter.send({ kind: "leaving", words: `the cell called ${words}` });
  process.exit = (code) => {
    announce(`process.exit(${code ?? ""})`);
    return exit.call(process, code);
  };
  process.abort = () => {
    announce("process.abort()");
    return abort.call(process);
  };
}
