// Restart and run all: every code cell in order in a fresh kernel, outputs collected, the first failure stops the run.
import { type KernelClient, KernelLost } from "./client.ts";
import { OutputCollector } from "./collect.ts";
import { type Cell, type CodeCell, type ErrorOutput, hasTag, isCode, type Notebook, type Output } from "./format.ts";
import { type StampOptions, stamped } from "./stamp.ts";

/** Tag by which a notebook's author says that a cell is meant to fail. */
const MAY_FAIL = "raises-exception";

export interface CellReport {
  /** Place among the code cells, from 1. */
  readonly position: number;
  readonly source: string;
  readonly status: "ok" | "failed" | "too long" | "kernel lost";
  /** Milliseconds from request to idle. */
  readonly duration: number;
  /** Of a cell that is not ok: the error to show. */
  readonly error?: ErrorOutput;
}

export interface RunEvents {
  /** Before a cell is sent. */
  readonly onCell?: (position: number, total: number, source: string) => void;
  readonly onReport?: (report: CellReport) => void;
}

export interface RunOptions extends RunEvents {
  /** Milliseconds a cell may take; no limit if absent. */
  readonly limit?: number | undefined;
  /** What the stamp is to tell of the run. */
  readonly stamp?: StampOptions;
  /** Stops the run between cells; whoever aborts also ends the kernel, which ends the cell. */
  readonly signal?: AbortSignal;
}

export interface Run {
  /** The notebook with new outputs; cells behind a failure have none. */
  readonly notebook: Notebook;
  readonly reports: readonly CellReport[];
  readonly total: number;
  /** The report that stopped the run; absent if all cells are done. */
  readonly failure?: CellReport;
}

/** Runs all code cells of a notebook in a kernel that has run nothing yet. The notebook given is not changed. */
export async function runNotebook(notebook: Notebook, client: KernelClient, options: RunOptions = {}): Promise<Run> {
  const collector = new OutputCollector();
  const total = notebook.cells.filter(isRunnable).length;
  const reports: CellReport[] = [];
  const finish: (() => Cell)[] = [];
  let failure: CellReport | undefined;
  for (const cell of notebook.cells) {
    if (!isCode(cell)) finish.push(() => cell);
    else if (failure || !isRunnable(cell)) finish.push(() => ({ ...cell, outputs: [], execution_count: null }));
    else {
      options.signal?.throwIfAborted();
      options.onCell?.(reports.length + 1, total, cell.source);
      const { report, executed } = await runCell(cell, reports.length + 1, client, collector, options);
      options.signal?.throwIfAborted();
      reports.push(report);
      finish.push(executed);
      options.onReport?.(report);
      if (report.status !== "ok") failure = report;
    }
  }
  // Outputs are read last: a later cell may have updated an earlier display.
  const cells = finish.map((cell) => cell());
  const executed = stamped({ ...notebook, metadata: namedMetadata(notebook, client), cells }, options.stamp);
  return { notebook: executed, reports, total, ...(failure ? { failure } : {}) };
}

function isRunnable(cell: Cell): cell is CodeCell {
  return isCode(cell) && cell.source.trim() !== "";
}

interface CellRun {
  readonly report: CellReport;
  readonly executed: () => Cell;
}

async function runCell(
  cell: CodeCell,
  position: number,
  client: KernelClient,
  collector: OutputCollector,
  { limit }: RunOptions,
): Promise<CellRun> {
  const collected = collector.cell();
  const started = performance.now();
  const mayFail = hasTag(cell, MAY_FAIL);
  const done = (status: CellReport["status"], count: number | null, fallback?: ErrorOutput): CellRun => {
    const error = collected.outputs.findLast(isError) ?? fallback;
    if (error && !collected.outputs.includes(error)) collected.append(error);
    const report = { position, source: cell.source, status, duration: performance.now() - started };
    return {
      report: status === "ok" || !error ? report : { ...report, error },
      executed: () => ({ ...cell, outputs: [...collected.outputs], execution_count: count }),
    };
  };
  try {
    const execution = await client.execute(cell.source, {
      limit,
      stopOnError: !mayFail,
      onMessage: (type, content) => collected.take({ type, content }),
    });
    const { status, executionCount, reply } = execution;
    if (status === "error" && mayFail) return done("ok", executionCount);
    return done(status === "error" ? "failed" : status, executionCount, errorOf(status, reply, limit));
  } catch (error) {
    if (!(error instanceof KernelLost)) throw error;
    return done("kernel lost", null, errorOutput("KernelLost", error.message));
  }
}

function isError(output: Output): output is ErrorOutput {
  return output.output_type === "error";
}

function errorOf(status: string, reply: Readonly<Record<string, unknown>>, limit = 0): ErrorOutput | undefined {
  if (status === "ok") return undefined;
  if (status === "too long") return errorOutput("TooLong", `interrupted after ${limit / 1000} s`);
  return errorOutput(String(reply.ename ?? "Error"), String(reply.evalue ?? ""));
}

function errorOutput(ename: string, evalue: string): ErrorOutput {
  return { output_type: "error", ename, evalue, traceback: [`${ename}: ${evalue}`] };
}

/** What front ends store of the kernel, so that the file opens with it everywhere. */
function namedMetadata(notebook: Notebook, client: KernelClient): Notebook["metadata"] {
  const { language_info } = client.info;
  const kernelspec = notebook.metadata.kernelspec ?? {
    display_name: "halfperiod (TypeScript)",
    language: "typescript",
    name: "halfperiod",
  };
  return { ...notebook.metadata, kernelspec, ...(language_info ? { language_info } : {}) };
}
