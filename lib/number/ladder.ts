import { type LibraryError, UndecidedError } from "../proof/errors.ts";
import { mayPass } from "./origin.ts";

/** Bits that a discrete decision is tried with; never the number of digits on display. */
export const LADDER: readonly number[] = [64, 128, 256, 512, 1024, 2048, 4096, 8192, 16384];

/**
 * The first answer that `attempt` gives at 64, 128, ... 16384 bits; undefined means "not at this precision". Errors that
 * more bits may cure (a straddled pole, cut or sign) count as no answer.
 *
 * Throws   UndecidedError after the last rung, with what `evidence` shows there (the enclosures, say) and the precision tried.
 */
export function decide<T>(
  subject: string,
  attempt: (prec: number) => T | undefined,
  evidence?: (prec: number) => string,
): T {
  let last: LibraryError | undefined;
  for (const prec of LADDER) {
    try {
      const answer = attempt(prec);
      if (answer !== undefined) return answer;
      last = undefined;
    } catch (error) {
      if (!mayPass(error)) throw error;
      last = error;
    }
  }
  const top = LADDER.at(-1)!;
  throw new UndecidedError({
    subject,
    given: `${evidence?.(64) ?? last?.given ?? "enclosures that allow more than one answer"}, tried up to ${top} bits`,
    expected: "a decision",
    hint: "An exact argument is needed, or sharper input.",
  });
}
