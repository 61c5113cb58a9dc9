// The cells that have run, and where their output belongs: a timer may print long after its cell is idle.
import type { CellEvent, MimeBundle } from "../cell/port.ts";
import { log } from "../wire/log.ts";
import type { Json, Parent } from "../wire/message.ts";
import type { Output } from "./output.ts";
import type { Prompts } from "./prompts.ts";

export interface Run extends Parent {
  /** Number of the run, rising; names it in the events of the cells. */
  readonly cell: number;
  readonly silent: boolean;
  readonly allowStdin: boolean;
  /** What the reply asks of the front end besides the outputs. Nothing is added once the run is closed. */
  readonly payload: Json[];
}

export interface Runs {
  /** Registers the run of a request. */
  open(request: Parent, options: { readonly silent: boolean; readonly allowStdin: boolean }): Run;
  /**
   * Ends the flow of a run: no prompt of it stays open. Its late output is still published. What a failed run showed aside
   * is shown in the page, as the reply of a failure holds nothing else.
   */
  close(run: Run, failed: boolean): void;
  /** Publishes what a cell reports, with the request that started it as parent. */
  report(event: CellEvent): void;
}

/** Runs remembered: the parent of a late print costs some hundred bytes each. */
const REMEMBERED = 100_000;
/** What a reply asks for at most: a cell that shows aside for ever must not grow the kernel. */
const PAYLOADS = 50;

export function createRuns(output: Output, prompts: Prompts): Runs {
  const runs = new Map<number, Run>();
  const open = new Set<Run>();
  let count = 0;
  return {
    open({ identities, headerBytes }, options) {
      count += 1;
      runs.delete(count - REMEMBERED);
      // a copy: the frame may be a window on a much larger piece of received bytes
      const run = { cell: count, identities, headerBytes: Buffer.from(headerBytes), payload: [], ...options };
      runs.set(count, run);
      open.add(run);
      return run;
    },
    close(run, failed) {
      open.delete(run);
      for (const { source, data } of failed ? run.payload : []) if (source === "page") showPage(data, run, output);
      prompts.close(run.cell);
    },
    report(event) {
      const run = runs.get(event.cell);
      if (!run) log(`output of a cell that is not known: ${event.type}`);
      else if (event.type === "input") prompts.ask(run, event.prompt, event.password);
      else if (run.silent) return;
      else if (event.type === "page" && open.has(run) && run.payload.length < PAYLOADS)
        addPage(run.payload, event.data);
      else if (event.type === "propose") open.has(run) && addProposal(run.payload, event.code, event.replace);
      else publishEvent(event, run, output);
    },
  };
}

function showPage(data: unknown, run: Run, output: Output): void {
  output.publish("display_data", { data, metadata: {}, transient: {} }, run);
}

function addPage(payload: Json[], data: MimeBundle): void {
  payload.push({ source: "page", data, start: 0 });
}

// One a cell: front ends make a new cell for each, and the latest is what the cell settled on.
function addProposal(payload: Json[], text: string, replace: boolean): void {
  const at = payload.findIndex(({ source }) => source === "set_next_input");
  if (at >= 0) payload.splice(at, 1);
  payload.push({ source: "set_next_input", text, replace });
}

function publishEvent(event: Exclude<CellEvent, { type: "input" | "propose" }>, run: Run, output: Output): void {
  if (event.type === "page")
    showPage(event.data, run, output); // too late for the reply, or too many
  else if (event.type === "stream") output.stream(event.name, event.text, run);
  else if (event.type === "clear") output.publish("clear_output", { wait: event.wait }, run);
  else publishDisplay(event, run, output);
}

function publishDisplay(event: CellEvent & { type: "display" }, run: Run, output: Output): void {
  const { data, metadata, displayId, update } = event;
  const content = { data, metadata, transient: displayId === undefined ? {} : { display_id: displayId } };
  if (update && displayId !== undefined) output.update(displayId, content, run);
  else output.publish("display_data", content, run);
}
