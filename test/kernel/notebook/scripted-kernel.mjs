// A kernel for tests of the client: the built wire and service with cells that do what a word says, so that the
// client is tried without a compiler. `node scripted-kernel.mjs -f FILE`.
import { setTimeout as sleep } from "node:timers/promises";
import { startKernel } from "../../../dist/kernel/service/kernel.js";
import { readConnection } from "../../../dist/kernel/wire/connection.js";
import { handleSignals, watchParent } from "../../../dist/kernel/wire/lifetime.js";

const bundle = (text) => ({ data: { "text/plain": text }, metadata: {} });
const ok = (text) => ({ status: "ok", userExpressions: {}, ...(text === undefined ? {} : { result: bundle(text) }) });
const failed = (ename, evalue) => ({ status: "error", ename, evalue, traceback: [`${ename}: ${evalue}`] });

function createCells({ onEvent }) {
  let stop = () => {};
  let answer = () => {};
  const words = {
    print: ({ cell }, text) => {
      onEvent({ type: "stream", cell, name: "stdout", text: `${text}\n` });
      return ok();
    },
    value: (_, text) => ok(text),
    fail: (_, text) => failed("Fault", text),
    hang: () => new Promise((resolve) => (stop = () => resolve(failed("Interrupted", "stopped")))),
    die: () => {
      process.stderr.write("out of memory, say\n");
      process.exit(7);
    },
    late: ({ cell }, text) => {
      sleep(300).then(() => onEvent({ type: "stream", cell, name: "stdout", text }));
      return ok();
    },
    ask: async ({ cell, allowStdin }, prompt) => {
      if (!allowStdin) return failed("NoInput", "nobody can be asked");
      onEvent({ type: "input", cell, prompt, password: false });
      return ok(await new Promise((resolve) => (answer = resolve)));
    },
  };
  return {
    start() {},
    async execute(request) {
      const [word, ...rest] = request.code.split(" ");
      return words[word](request, rest.join(" "));
    },
    answerInput: (value) => answer(value),
    interrupt: () => stop(),
    complete: async () => ({ start: 0, end: 0, matches: [] }),
    inspect: async () => undefined,
    isComplete: async () => ({ status: "complete" }),
    shutdown: async () => {},
  };
}

const { argv } = process;
const kernel = await startKernel(readConnection(argv[argv.indexOf("-f") + 1]), {
  createCells: async (o) => createCells(o),
});
handleSignals({ interrupt: kernel.interrupt, end: argv.includes("--stubborn") ? () => {} : kernel.end });
watchParent(process.ppid, kernel.end);
if (argv.includes("--stubborn")) setInterval(() => {}, 1000);
await kernel.ended;
if (!argv.includes("--stubborn")) process.exit(0);
