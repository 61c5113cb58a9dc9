// What running code can ask of the front end: display, clear, a line of input.
import { setPageHost } from "../../../lib/page/host.ts";
import { currentOwner } from "./ownership.ts";
import type { Reporter } from "./report.ts";

type Answer = (value: string | null) => void;

let waiting: Answer | undefined;
let report: Reporter | undefined;

/** Connects the host functions; the result takes the answer to an open question. */
export function connectHost(reporter: Reporter): Answer {
  report = reporter;
  setPageHost({
    display(data, { displayId, update }) {
      const options = { ...(displayId !== undefined && { displayId }), ...(update !== undefined && { update }) };
      reporter.send({ kind: "display", cell: currentOwner().cell, data, metadata: {}, ...options });
    },
  });
  return (value) => {
    const answer = waiting;
    waiting = undefined;
    answer?.(value);
  };
}

/** Asks for a line where the front end allows it; null is the end of input. */
export function askLine(prompt: string, password = false): Promise<string | null> {
  const owner = currentOwner();
  if (!owner.allowStdin || !report) {
    return Promise.reject(
      new Error("ask: this front end takes no input; expected one that does. Give the value in the cell itself."),
    );
  }
  report.send({ kind: "input", cell: owner.cell, prompt, password });
  return new Promise((resolve) => {
    waiting = resolve;
  });
}
