// What a cell is told when something other than its own code decides its outcome.
import { constants } from "node:os";
import type { Death } from "./cells-client.ts";
import type { ErrorReport } from "./port.ts";

/** Names that are told one by one. */
const MOST_NAMES = 8;

function report(ename: string, evalue: string): ErrorReport {
  return { ename, evalue, traceback: [`\u001b[31m${ename}\u001b[0m: ${evalue}`] };
}

/** What is known when the process of the cells has ended in the middle of a cell. */
export interface Loss {
  readonly death: Death;
  readonly interrupted: boolean;
  /** Variables that are gone, in the order of their definition. */
  readonly names: readonly string[];
  /** Limit of the memory in MB. */
  readonly memoryLimit: number | undefined;
}

/** The process of the cells has ended: why, what is lost, and how it goes on. */
export function deathReport(loss: Loss): ErrorReport {
  const lost = `All variables are lost${nameList(loss.names)}`;
  return report(
    "SessionEnded",
    `${cause(loss)}. ${lost}; a fresh session has been started, and the next cell runs. Run the cells above again for what you need.`,
  );
}

function nameList(names: readonly string[]): string {
  if (names.length === 0) return "";
  const more = names.length - MOST_NAMES;
  return ` (${names.slice(0, MOST_NAMES).join(", ")}${more > 0 ? ` and ${more} more` : ""})`;
}

function cause({ death, interrupted, memoryLimit }: Loss): string {
  if (death.words) return death.words;
  if (death.outOfMemory) {
    const limit =
      memoryLimit === undefined ? "HALFPERIOD_MEMORY sets" : `it may have ${memoryLimit} MB; HALFPERIOD_MEMORY sets`;
    return `the cell ran out of memory (${limit} another limit)`;
  }
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
