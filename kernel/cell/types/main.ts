// Process "types": answers requests on standard input, one JSON value a line, until it closes.
import { encodeLine, LineReader } from "../lines.ts";
import type { TypesAnswers, TypesRequest } from "../messages.ts";
import { complete } from "./complete.ts";
import { completeness } from "./completeness.ts";
import { defaultPlaces } from "./host.ts";
import { inspect } from "./inspect.ts";
import { NotebookTypes } from "./service.ts";

const types = new NotebookTypes(defaultPlaces(process.argv[2] ?? process.cwd()));

function answer(request: TypesRequest): TypesAnswers[TypesRequest["kind"]] {
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

function reply(line: string): void {
  const request = JSON.parse(line) as TypesRequest;
  try {
    process.stdout.write(encodeLine({ id: request.id, answer: answer(request) }));
  } catch (error) {
    const failure = error instanceof Error ? (error.stack ?? error.message) : String(error);
    process.stdout.write(encodeLine({ id: request.id, failure }));
  }
}

// The group gets the signals of a terminal; the kernel alone decides when this process ends.
process.on("SIGINT", () => {});
const reader = new LineReader();
process.stdin.on("data", (chunk: Buffer) => {
  for (const line of reader.push(chunk)) reply(line);
});
process.stdin.on("end", () => process.exit(0));
types.warm();
process.stdout.write(encodeLine({ ready: true }));
