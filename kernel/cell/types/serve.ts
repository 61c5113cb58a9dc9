// Answers requests on standard input, one JSON value a line, until it closes.
import { encodeLine, LineReader } from "../lines.ts";
import type { TypesAnswers, TypesRequest } from "../messages.ts";
import { complete } from "./complete.ts";
import { completeness } from "./completeness.ts";
import { inspect } from "./inspect.ts";
import type { NotebookTypes } from "./service.ts";

/** Serves one notebook. */
export function serve(types: NotebookTypes): void {
  // The group gets the signals of a terminal; the kernel alone decides when this process ends.
  process.on("SIGINT", () => {});
  const reader = new LineReader();
  process.stdin.on("data", (chunk: Buffer) => {
    for (const line of reader.push(chunk)) process.stdout.write(encodeLine(reply(types, line)));
  });
  process.stdin.on("end", () => process.exit(0));
  process.stdout.write(encodeLine({ ready: true }));
}

function reply(types: NotebookTypes, line: string): object {
  const request = JSON.parse(line) as TypesRequest;
  try {
    return { id: request.id, answer: answer(types, request) };
  } catch (error) {
    return { id: request.id, failure: error instanceof Error ? (error.stack ?? error.message) : String(error) };
  }
}

function answer(types: NotebookTypes, request: TypesRequest): TypesAnswers[TypesRequest["kind"]] {
  switch (request.kind) {
    case "check":
      return types.check(request.cell, request.executionCount, request.code);
    case "commit":
      return types.commit(request.cell, request.defined, request.complete) ?? null;
    case "reset":
      types.reset();
      return null;
    case "restore":
      types.restore(request.cell, request.declarations);
      return null;
    case "complete":
      return complete(types, request.code, request.offset);
    case "inspect":
      return inspect(types, request.code, request.offset, request.detail) ?? null;
    case "isComplete":
      return completeness(request.code);
  }
}
