// Questions to the user: input_request goes out on stdin to the client whose cell asks, one at a time.
import type { Message, Outgoing, Parent } from "../wire/message.ts";
import { optionalText } from "./fields.ts";
import type { Run } from "./runs.ts";

export interface Prompts {
  /** Asks the client of the run. A run that may not ask gets the end of file at once. */
  ask(run: Run, prompt: string, password: boolean): void;
  /** Takes an input_reply; one that nobody waits for is dropped. */
  answer(reply: Message): void;
  /** Forgets the open question of a cell. */
  close(cell: number): void;
}

/** End of file, as terminal consoles send it. */
const END_OF_FILE = "\u0004";

interface Ports {
  /** Resolves when what was sent on stdin before is in. */
  arrived(): Promise<void>;
  /** Sends on stdin, after the text that was printed before; gives the msg_id. */
  send(identities: readonly Buffer[], outgoing: Outgoing): string;
  /** Hands the answer to the cells; null is end of file. */
  answer(value: string | null): void;
}

export function createPrompts({ arrived, send, answer }: Ports): Prompts {
  /** Without `id` the question is not out yet: what comes now answers an earlier one. */
  let open: { readonly run: Run; id?: string } | undefined;
  return {
    ask(run, prompt, password) {
      if (!run.allowStdin) return answer(null);
      const question: typeof open = { run };
      open = question;
      void arrived().then(() => {
        if (open !== question) return; // the cell was stopped meanwhile
        question.id = send(run.identities, { type: "input_request", content: { prompt, password }, parent: run });
      });
    },
    answer(reply) {
      if (reply.header.msg_type !== "input_reply" || !open?.id || !answers(reply, open.run, open.id)) return;
      open = undefined;
      const value = optionalText(reply.content, "value") ?? "";
      answer(value === END_OF_FILE ? null : value);
    },
    close(cell) {
      if (open?.run.cell === cell) open = undefined;
    },
  };
}

// From the client that was asked, and not the late answer to an earlier question: newer clients name the question as
// the parent, older ones name none, so a parent of our own making that is another message is stale.
function answers(reply: Message, run: Run, id: string): boolean {
  if (!sameClient(reply, run)) return false;
  return reply.parentHeader.msg_id === id || reply.parentHeader.msg_type !== "input_request";
}

function sameClient(a: Parent, b: Parent): boolean {
  return (
    a.identities.length === b.identities.length &&
    a.identities.every((identity, at) => identity.equals(b.identities[at] as Buffer))
  );
}
