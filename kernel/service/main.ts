// The kernel process: `node main.js -f FILE`. The type checker takes longest to start, so it starts first, even before
// the sockets are loaded.
import { launchTypesEarly } from "../cell/launch.ts";

/** Path of the connection file in the arguments: after -f, or alone. */
function connectionFile(args: readonly string[]): string | undefined {
  const at = args.indexOf("-f");
  return at >= 0 ? args[at + 1] : args.find((argument) => !argument.startsWith("-"));
}

const file = connectionFile(process.argv.slice(2));
if (file === undefined) {
  process.stderr.write(
    "halfperiod: kernel: no connection file given; expected -f FILE. A notebook front end starts the kernel so.\n",
  );
  process.exitCode = 2;
} else {
  launchTypesEarly(process.cwd(), process.argv.includes("--confined"));
  void import("./run.ts").then(({ run }) => run(file));
}
