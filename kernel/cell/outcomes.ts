// What a cell is told when something other than its own code decides its outcome.
import { constants } from "node:os";
import type { Death } from "./cells-client.ts";
import type { ErrorReport } from "./port.ts";

const FRESH = "All variables are lost; a fresh session has been started, and the next cell runs.";

function report(ename: string, evalue: string): ErrorReport {
  return { ename, evalue, traceback: [`\u001b[31m${ename}\u001b[0m: ${evalue}`] };
}

/** The process of the cells has ended in the middle of a cell. */
export function deathReport(death: Death, interrupted: boolean): ErrorReport {
  return report("SessionEnded", `${cause(death, interrupted)}. ${FRESH}`);
}

function cause(death: Death, interrupted: boolean): string {
  if (death.words) return death.words;
  if (death.outOfMemory) return "the cell ran out of memory";
  if (interrupted && death.signal === "SIGKILL")
    return "the cell could not be stopped in any other way than by ending its process";
  if (death.signal) return `the process of the cells was ended by ${death.signal}${meaning(death.signal)}`;
  if (death.code !== null && death.code > 128) {
    const signal = signalName(death.code - 128);
    return `the process of the cells was ended by ${signal}${meaning(signal)}`;
  }
  return `the process of the cells ended with status ${death.code ?? "unknown"}`;
}

function signalName(number: number): string {
  return Object.entries(constants.signals).find(([, value]) => value === number)?.[0] ?? `signal ${number}`;
}

const MEANINGS: Readonly<Record<string, string>> = {
  SIGSEGV: " (native code touched memory that it must not)",
  SIGABRT: " (something in it called abort)",
  SIGKILL: " (from outside, as a system that is short of memory does)",
};

function meaning(signal: string): string {
  return MEANINGS[signal] ?? "";
}

export function interruptedBeforeRun(): ErrorReport {
  return report("Interrupted", "the cell was stopped before it ran; no variable has changed");
}

/** The checker itself failed: a fault of this program, said so. */
export function failedCheck(error: unknown): ErrorReport {
  const words = error instanceof Error ? error.message : String(error);
  return report("CheckFailed", `the type checker failed (${words}); the cell was not run. Run it again.`);
}
