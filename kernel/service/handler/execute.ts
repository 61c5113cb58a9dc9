import type { ExecuteOutcome } from "../../cell/port.ts";
import type { Json } from "../../wire/message.ts";
import { flag, requiredText, textEntries } from "../fields.ts";
import { onePage } from "../pages.ts";
import type { Run } from "../runs.ts";
import { type Answer, failure, type Handler, type Service } from "../service.ts";

interface Options {
  readonly code: string;
  readonly cellId?: string;
  readonly silent: boolean;
  /** Counted and kept in the history. */
  readonly stored: boolean;
  readonly allowStdin: boolean;
  readonly stopOnError: boolean;
  readonly userExpressions: Readonly<Record<string, string>>;
}

/** execute_request: runs one cell and publishes what it gives, in order. */
export const executeRequest: Handler = async (request, service) => {
  const started = new Date().toISOString();
  let options: Options;
  try {
    options = readOptions(request.content, request.metadata);
  } catch (error) {
    return { content: { ...failure(error), execution_count: service.executionCount } };
  }
  const { interruptions } = service;
  await service.audience();
  if (options.stored) service.executionCount += 1;
  const count = service.executionCount;
  const run = service.runs.open(request, options);
  if (!options.silent) service.output.publish("execute_input", { code: options.code, execution_count: count }, run);
  const entry = options.stored ? (await service.history()).add(count, options.code) : undefined;
  const stopped = service.interruptions !== interruptions;
  const ran = stopped ? STOPPED : await runCell(options, run, count, service);
  service.runs.close(run, ran.status === "error");
  const outcome = options.silent ? ran : publishOutcome(ran, run, count, service);
  if (entry && outcome.status === "ok") entry.output = plainText(outcome);
  if (outcome.status === "error" && options.stopOnError && !options.silent) await service.abortQueued();
  return { content: replyContent(outcome, count, run), metadata: { started }, afterOutput: true };
};

/** The answer to an execute request that is not run because a cell before it failed. */
export function abortedAnswer(service: Service): Answer {
  return {
    content: {
      status: "error",
      ename: "Aborted",
      evalue: "not run, as a cell before it failed",
      traceback: [],
      execution_count: service.executionCount,
    },
  };
}

function readOptions(content: Json, { cellId }: Json): Options {
  const silent = flag(content, "silent", false);
  return {
    code: requiredText(content, "code"),
    ...(typeof cellId === "string" && { cellId }),
    silent,
    stored: !silent && flag(content, "store_history", true),
    allowStdin: flag(content, "allow_stdin", false),
    stopOnError: flag(content, "stop_on_error", true),
    userExpressions: textEntries(content, "user_expressions"),
  };
}

const STOPPED: ExecuteOutcome = {
  status: "error",
  ename: "Interrupted",
  evalue: "the cell was stopped before it ran",
  traceback: ["Interrupted: the cell was stopped before it ran"],
};
const NOTHING: ExecuteOutcome = { status: "ok", userExpressions: {} };

async function runCell(options: Options, run: Run, executionCount: number, service: Service): Promise<ExecuteOutcome> {
  // A prompt asks for the counter with an empty cell; that needs no cells to be up.
  if (options.code.trim() === "" && Object.keys(options.userExpressions).length === 0) return NOTHING;
  try {
    const { stored, stopOnError, ...asked } = options;
    const cells = await service.cells();
    return await cells.execute({ ...asked, cell: run.cell, executionCount });
  } catch (error) {
    return failure(error);
  }
}

/** Publishes how the cell ended, and gives it: a result that cannot be written as JSON has become an error. */
function publishOutcome(outcome: ExecuteOutcome, run: Run, count: number, service: Service): ExecuteOutcome {
  const { output } = service;
  if (outcome.status === "error") {
    const { ename, evalue, traceback } = outcome;
    output.publish("error", { ename, evalue, traceback }, run);
  } else if (outcome.result) {
    const { data, metadata } = outcome.result;
    try {
      output.publish("execute_result", { execution_count: count, data, metadata }, run);
    } catch (error) {
      return publishOutcome(failure(error), run, count, service);
    }
  }
  return outcome;
}

function replyContent(outcome: ExecuteOutcome, count: number, { payload }: Run): Json {
  if (outcome.status === "error") {
    const { ename, evalue, traceback } = outcome;
    return { status: "error", execution_count: count, ename, evalue, traceback };
  }
  return { status: "ok", execution_count: count, payload: onePage(payload), user_expressions: outcome.userExpressions };
}

function plainText(outcome: ExecuteOutcome & { status: "ok" }): string | null {
  const text = outcome.result?.data["text/plain"];
  return typeof text === "string" ? text : null;
}
