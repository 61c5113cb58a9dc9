import { DomainError } from "../proof/errors.ts";
import { pageHost } from "./host.ts";

/**
 * Asks the reader of the page for a line: `const n = await ask("how many digits?")`.
 *
 * `hidden` keeps the line from being shown, where the front end can. undefined is the end of the input.
 * Throws   DomainError where nobody can answer, as when a notebook is executed without a front end.
 */
export async function ask(prompt = "", options: { readonly hidden?: boolean } = {}): Promise<string | undefined> {
  const host = pageHost();
  if (!host.ask) {
    throw new DomainError({
      subject: "ask",
      given: "a place where nobody can answer",
      expected: "a front end that takes input",
      hint: "Give the value in the cell itself.",
    });
  }
  return (await host.ask(prompt, options.hidden ?? false)) ?? undefined;
}
