// Real messages of the kernel, written down as literals and compiled against the types that the front ends' JavaScript
// client publishes. A literal with a missing, a wrong or an unknown field does not compile.
import { writeFileSync } from "node:fs";
import path from "node:path";
import ts from "typescript";
import { afterAll, beforeAll, expect, it } from "vitest";
import { Client, type Received } from "../../kernel/client.ts";
import { build, type KernelProcess, startProcess } from "../../kernel/process.ts";
import { artefacts } from "../hosts.ts";

/** Type of the client's library for each message type that the library knows. */
const TYPES: Readonly<Record<string, string>> = {
  status: "IStatusMsg",
  stream: "IStreamMsg",
  error: "IErrorMsg",
  display_data: "IDisplayDataMsg",
  update_display_data: "IUpdateDisplayDataMsg",
  clear_output: "IClearOutputMsg",
  execute_input: "IExecuteInputMsg",
  execute_result: "IExecuteResultMsg",
  comm_close: 'ICommCloseMsg<"iopub">',
  execute_reply: "IExecuteReplyMsg",
  kernel_info_reply: "IInfoReplyMsg",
  complete_reply: "ICompleteReplyMsg",
  inspect_reply: "IInspectReplyMsg",
  is_complete_reply: "IIsCompleteReplyMsg",
  history_reply: "IHistoryReplyMsg",
  comm_info_reply: "ICommInfoReplyMsg",
  interrupt_reply: "IInterruptReplyMsg",
  input_request: "IInputRequestMsg",
};
/** In the protocol, not in those types: the welcome of iopub and the end. */
const UNTYPED = ["iopub_welcome", "shutdown_reply"];
/** A field that the protocol still has and the types have dropped. */
const DROPPED = "debugger";
/** The protocol has null for the output of a cell without one, the types have not. */
const withoutNull = (entry: readonly unknown[]) => JSON.parse(JSON.stringify(entry).replace(/,null\]/g, ',""]'));

let kernel: KernelProcess;
let client: Client;
const messages: { readonly channel: string; readonly message: Received }[] = [];

beforeAll(async () => {
  await build();
  kernel = await startProcess();
  client = await new Client(kernel.fields).connect();
  await converse();
  const channelOf = (type: string) => (type === "interrupt_reply" ? "control" : "shell");
  const all = (channel: (type: string) => string, list: readonly Received[]) =>
    list.map((message) => ({ channel: channel(message.header.msg_type), message }));
  messages.push(
    ...all(() => "iopub", client.published),
    ...all(channelOf, client.replies),
    ...all(() => "stdin", client.questions),
  );
}, 600_000);
afterAll(async () => {
  client?.close();
  await kernel?.exited;
});

/** One of each kind of request, with each kind of answer. */
async function converse(): Promise<void> {
  const cells = [
    [
      "const a: number = 6; console.log('b'); console.error('c'); a * 7",
      { user_expressions: { x: "a", y: "nothing" } },
    ],
    ["throw new RangeError('deliberate')", {}],
    ["const n: number = 'text'", {}],
    ["curve`y^2 = x^3 - x`", {}],
    ["typeset(figure.lattice(lattice({ tau: i })))", {}],
    ["for (const n of progress([1, 2, 3])) await new Promise((r) => setTimeout(r, 60))", {}],
    ["console.clear(); typeset(1, { aside: true }); notebook.propose('1 + 1')", {}],
    ["1", { silent: true }],
  ] as const;
  for (const [code, options] of cells) await client.execute(code, options);
  const asking = await client.send("shell", "execute_request", { code: 'await ask("x?")', allow_stdin: true });
  const question = await client.until(() => client.questions[0]);
  await client.send("stdin", "input_reply", { status: "ok", value: "7" }, question.header);
  await client.exchange(asking);
  await client.request("shell", "complete_request", { code: "Math.hyp", cursor_pos: 8 });
  await client.request("shell", "inspect_request", { code: "Math.hypot", cursor_pos: 10, detail_level: 1 });
  await client.request("shell", "inspect_request", { code: " ", cursor_pos: 1, detail_level: 0 });
  for (const code of ["1", "for (;;) {", ")"]) await client.request("shell", "is_complete_request", { code });
  for (const output of [true, false]) {
    await client.request("shell", "history_request", { hist_access_type: "tail", n: 3, raw: true, output });
  }
  await client.request("shell", "history_request", { hist_access_type: "search", n: 3, pattern: 7 });
  await client.request("shell", "execute_request", { code: 5 });
  await client.request("shell", "comm_info_request", {});
  await client.idle(await client.send("shell", "comm_open", { comm_id: "c", target_name: "none", data: {} }));
  await client.request("control", "kernel_info_request", {});
  await client.request("control", "interrupt_request", {});
  await client.request("control", "shutdown_request", { restart: false });
}

/** Findings of the compiler for messages as literals. */
function findings(list: readonly { readonly channel: string; readonly message: Received }[]): string[] {
  const lines = list.map(({ channel, message: { header, parent, metadata, content } }, at) => {
    const literal = { channel, header, parent_header: parent, metadata, content };
    return `export const m${at}: K.${TYPES[header.msg_type]} = ${JSON.stringify(literal)};`;
  });
  const file = path.join(artefacts, "messages.ts");
  writeFileSync(file, `import type { KernelMessage as K } from "@jupyterlab/services";\n${lines.join("\n")}\n`);
  const program = ts.createProgram([file], {
    noEmit: true,
    strict: true,
    skipLibCheck: true,
    types: [],
    module: ts.ModuleKind.ESNext,
    moduleResolution: ts.ModuleResolutionKind.Bundler,
    target: ts.ScriptTarget.ES2022,
  });
  return ts.getPreEmitDiagnostics(program).map((diagnostic) => {
    const line = diagnostic.file?.getLineAndCharacterOfPosition(diagnostic.start ?? 0).line ?? 0;
    const text = ts.flattenDiagnosticMessageText(diagnostic.messageText, " ");
    return `${list[line - 1]?.message.header.msg_type ?? diagnostic.file?.fileName}: ${text}`;
  });
}

const typed = () =>
  messages
    .filter(({ message }) => Object.hasOwn(TYPES, message.header.msg_type))
    .map(({ channel, message }) => {
      const { [DROPPED]: _, ...content } = message.content;
      const history = content.history && { history: content.history.map(withoutNull) };
      return { channel, message: { ...message, content: { ...content, ...history } } };
    });

it("every message that the client's library knows was sent, and none besides — oracle: its list of types", () => {
  const sent = new Set(messages.map(({ message }) => message.header.msg_type));
  expect([...sent].sort()).toEqual([...Object.keys(TYPES), ...UNTYPED].sort());
});

it("all messages compile against the published types — oracle: the compiler", () => {
  expect(typed().length).toBeGreaterThan(80);
  expect(findings(typed())).toEqual([]);
});

it("a wrong, a missing and an unknown field would be found — oracle: the faults put in", () => {
  const [stream] = typed().filter(({ message }) => message.header.msg_type === "stream");
  if (!stream) throw new Error("no stream");
  const changed = (content: object) => ({ ...stream, message: { ...stream.message, content } });
  const faults = [
    { name: "stdout", text: 5 },
    { name: "stdout" },
    { name: "stdout", text: "", more: 1 },
    { name: "log", text: "" },
  ];
  expect(findings(faults.map(changed)).length).toBe(faults.length);
});
