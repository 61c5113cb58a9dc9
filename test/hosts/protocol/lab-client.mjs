// The published JavaScript client of notebook servers, against a live server. It checks each message that comes on iopub
// against the protocol's fields and throws if one is wrong. Its last line says what happened, as JSON for the test
// beside it. Arguments: address and token of the server.
import services from "@jupyterlab/services";
import { validateMessage } from "@jupyterlab/services/lib/kernel/validate.js";
import WebSocket from "ws";

const [baseUrl, token] = process.argv.slice(2);
const { KernelAPI, KernelManager, KernelMessage, KernelSpecAPI, ServerConnection } = services;

const serverSettings = ServerConnection.makeSettings({
  baseUrl,
  wsUrl: baseUrl.replace("http", "ws"),
  token,
  appendToken: true,
  WebSocket,
});
const facts = { messages: 0, invalid: [] };
const specs = await KernelSpecAPI.getSpecs(serverSettings);
facts.spec = specs.kernelspecs.halfperiod;

const manager = new KernelManager({ serverSettings });
const kernel = await manager.startNew({ name: "halfperiod" });
kernel.anyMessage.connect((_, { msg, direction }) => {
  if (direction !== "recv") return;
  facts.messages += 1;
  try {
    validateMessage(msg);
  } catch (error) {
    facts.invalid.push(`${msg.header.msg_type}: ${error.message}`);
  }
});
facts.info = await kernel.info;

async function execute(code, options = {}) {
  const outputs = [];
  const future = kernel.requestExecute({ code, ...options });
  future.onIOPub = (message) => {
    if (message.header.msg_type !== "status") outputs.push([message.header.msg_type, message.content]);
  };
  if (options.allow_stdin) {
    future.onStdin = (message) => {
      if (KernelMessage.isInputRequestMsg(message)) kernel.sendInputReply({ value: "7", status: "ok" }, message.header);
    };
  }
  const reply = await future.done;
  return { reply: reply.content, outputs };
}

facts.plain = await execute("const a: number = 6; console.log('b'); a * 7");
facts.failed = await execute("throw new RangeError('deliberate')", { stop_on_error: false });
facts.rich = await execute("curve`y^2 = x^3 - x`");
facts.asked = await execute('await ask("x?")', { allow_stdin: true });
facts.completion = (await kernel.requestComplete({ code: '"😀"; Math.hyp', cursor_pos: 13 })).content;
facts.inspection = (await kernel.requestInspect({ code: "Math.hypot", cursor_pos: 10, detail_level: 0 })).content;
facts.complete = (await kernel.requestIsComplete({ code: "for (;;) {" })).content;
facts.history = (await kernel.requestHistory({ hist_access_type: "tail", n: 2, raw: true, output: false })).content;
facts.comms = (await kernel.requestCommInfo({})).content;
const endless = kernel.requestExecute({ code: "console.log('begun'); for (;;);" });
await new Promise((resolve) => {
  endless.onIOPub = ({ header }) => header.msg_type === "stream" && resolve();
});
await kernel.interrupt();
facts.interrupted = (await endless.done).content;
facts.status = kernel.status;
await kernel.restart();
facts.restarted = await execute("typeof a");
await kernel.shutdown();
facts.left = (await KernelAPI.listRunning(serverSettings)).length;
process.stdout.write(`\n${JSON.stringify(facts)}`);
process.exit(0);
