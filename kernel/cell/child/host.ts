// What running code can ask of the front end, behind the library's page port: display, a line of input, what has run.
import { type CellRun, setPageHost } from "../../../lib/page/host.ts";
import { currentOwner, type Owner } from "./ownership.ts";
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
  const questions = createQuestions(notebook);
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
      const { cell } = owner;
      return (prompt: string, password: boolean) =>
        questions.ask(owner, () => reporter.send({ kind: "input", cell, prompt, password }));
    },
    propose: (code, replace) => reporter.send({ kind: "propose", cell: currentOwner().cell, code, replace }),
    runs: () => notebook.runs,
  });
  return questions.answer;
}

type Line = string | null;

interface Question {
  readonly owner: Owner;
  readonly put: () => void;
  readonly resolve: (line: Line) => void;
}

/**
 * The questions of the cells. A front end takes one at a time, so the others wait; the interrupt of a cell ends all of its
 * own, and one that an earlier cell left behind ends, unanswered, when a later cell asks.
 */
function createQuestions(notebook: Notebook) {
  let open: Question[] = []; // the first one is with the front end
  const leave = (stays: (question: Question) => boolean) => {
    const [asked] = open;
    open = open.filter(stays);
    if (open[0] !== asked) open[0]?.put();
  };
  return {
    answer(line: Line): void {
      const [asked] = open;
      leave((question) => question !== asked);
      asked?.resolve(line);
    },
    async ask(owner: Owner, put: () => void): Promise<Line> {
      for (const question of open) if (question.owner.cell < owner.cell) question.resolve(null);
      open = open.filter((question) => question.owner.cell >= owner.cell);
      const line = new Promise<Line>((resolve) => open.push({ owner, put, resolve }));
      if (open.length === 1) put();
      try {
        return await notebook.interruptible(line);
      } catch (reason) {
        leave((question) => question.owner !== owner);
        throw reason;
      }
    },
  };
}
