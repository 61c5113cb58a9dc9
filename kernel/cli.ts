// The command. Each verb lives in the folder that does the work; this file only chooses, and loads what it chose.
import { type Console, EXIT } from "./notebook/command/console.ts";
import { USAGE } from "./notebook/command/usage.ts";

interface Command {
  readonly purpose: string;
  /** All options, for a command that has many; usage and purpose if absent. */
  help?(): Promise<string>;
  run(args: readonly string[], console: Console): Promise<number>;
}

type Name = keyof typeof USAGE;

const COMMANDS: Readonly<Record<Name, Command>> = {
  demo: {
    purpose: "run the notebooks that come along; executed notebooks and pages go to ./output",
    run: async (args, console) => (await import("./notebook/command/demo.ts")).demoCommand(args, console),
  },
  run: {
    purpose: "run all cells in a fresh kernel and keep the outputs",
    help: () => confinedHelp("run"),
    run: async (args, console) => (await import("./notebook/command/run.ts")).runCommand(args, console),
  },
  check: {
    purpose: "run again and compare with what is stored, by mathematics; the files stay as they are",
    help: () => confinedHelp("check"),
    run: async (args, console) => (await import("./notebook/command/check.ts")).checkCommand(args, console),
  },
  export: {
    purpose: "write a page that opens anywhere, the LaTeX source of a paper, or a plain TypeScript script",
    run: async (args, console) => (await import("./notebook/command/export.ts")).exportCommand(args, console),
  },
  dossier: {
    purpose:
      "one archive for a referee: notebook, page, script, values and certificates as data, how to cite and check",
    run: async (args, console) => (await import("./notebook/command/dossier.ts")).dossierCommand(args, console),
  },
  install: {
    purpose: "make the kernel known to notebook front ends, of this user or in DIR/kernels; again: repair",
    help: async () => (await import("./service/install/options.ts")).INSTALL_USAGE,
    run: async (args) => (await import("./service/install/install.ts")).install(args),
  },
  remove: {
    purpose: "take the kernel away from where install put it",
    help: async () => (await import("./service/install/options.ts")).REMOVE_USAGE,
    run: async (args) => (await import("./service/install/install.ts")).remove(args),
  },
  diagnose: {
    purpose: "which front ends find the kernel, whether it starts, how fast, and what to do if not",
    run: async (args, console) => (await import("./notebook/command/diagnose.ts")).diagnoseCommand(args, console),
  },
};

function isName(word: string): word is Name {
  return Object.hasOwn(COMMANDS, word);
}

/** Runs `halfperiod <args>` and gives the exit code. */
export async function main(args: readonly string[], console: Console = standardConsole()): Promise<number> {
  const [name, ...rest] = args;
  if (name === undefined || name === "help" || name === "--help" || name === "-h") {
    console.out.write(usage());
    return EXIT.ok;
  }
  if (name === "--version") {
    const { packageVersion } = await import("./service/info.ts");
    console.out.write(`${packageVersion()}\n`);
    return EXIT.ok;
  }
  if (!isName(name)) {
    console.err.write(`halfperiod: no command "${name}"; expected ${Object.keys(COMMANDS).join(", ")}\n`);
    return EXIT.usage;
  }
  if (rest.includes("--help") || rest.includes("-h")) {
    const help = await COMMANDS[name].help?.();
    console.out.write(help === undefined ? describe(name) : `${help}\n`);
    return EXIT.ok;
  }
  return attempt(() => COMMANDS[name].run(rest, console), console);
}

/** Known complaints in one line and a code of their own; anything else is a fault of ours and keeps its stack. */
async function attempt(action: () => Promise<number>, { err }: Console): Promise<number> {
  try {
    return await action();
  } catch (error) {
    const { name, message, stack } = error instanceof Error ? error : new Error(String(error));
    if (name === "Interrupted") {
      err.write(`halfperiod: ${message}\n`);
      return EXIT.interrupted;
    }
    const expected = ["UsageError", "NotebookError", "KernelLost"].includes(name);
    err.write(`halfperiod: ${expected ? message : stack}\n`);
    return EXIT.usage;
  }
}

async function confinedHelp(name: "run" | "check"): Promise<string> {
  const { CONFINED_WORDS } = await import("./notebook/confined.ts");
  return `${describe(name)}\n--confined: ${CONFINED_WORDS}`;
}

function usage(): string {
  const title = "halfperiod: a notebook kernel for cubic curves, lattices and elliptic functions, with proved digits";
  return `${title}\n\n${Object.keys(COMMANDS).filter(isName).map(describe).join("")}`;
}

function describe(name: Name): string {
  return `  halfperiod ${USAGE[name]}\n      ${COMMANDS[name].purpose}\n`;
}

function standardConsole(): Console {
  return { out: process.stdout, err: process.stderr };
}
