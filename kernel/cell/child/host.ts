// What running code can ask of the front end, behind the library's page port: display, a line of input, what has run.
import { type CellRun, setPageHost } from "../../../lib/page/host.ts";
import { currentOwner } from "./ownership.ts";
import type { Reporter } from "./report.ts";

type Answer = (value: string | null) => void;

/** The part of a runner that answers for the notebook. */
interface Notebook {
  readonly runs: readonly CellRun[];
  /** A promise that the interrupt of the running cell rejects. */
  interruptible<T>(promise: Promise<T>): Promise<T>;
}

/** Connects the library's port, and the console's clearing of what a cell has shown; the result takes the answer to an open question. */
export function connectHost(reporter: Reporter, notebook: Notebook): Answer {
  let waiting: Answer | undefined;
  console.clear = () => reporter.send({ kind: "clear", cell: currentOwner().cell, wait: false });
  setPageHost({
    display(data, { displayId, update, aside }) {
      if (aside) return reporter.send({ kind: "page", cell: currentOwner().cell, data });
      const options = { ...(displayId !== undefined && { displayId }), ...(update !== undefined && { update }) };
      reporter.send({ kind: "display", cell: currentOwner().cell, data, metadata: {}, ...options });
    },
    // Read at each call, so that a cell without input is told so at once.
    get ask() {
      const owner = currentOwner();
      if (!owner.allowStdin) return undefined;
      return (prompt: string, hidden: boolean) => {
        reporter.send({ kind: "input", cell: owner.cell, prompt, password: hidden });
        return notebook.interruptible(
          new Promise<string | null>((resolve) => {
            waiting = resolve;
          }),
        );
      };
    },
    propose: (code, replace) => reporter.send({ kind: "propose", cell: currentOwner().cell, code, replace }),
    runs: () => notebook.runs,
  });
  return (value) => {
    const answer = waiting;
    waiting = undefined;
    answer?.(value);
  };
}
