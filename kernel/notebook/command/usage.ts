// The words behind `halfperiod`, one line a command: for the list of commands and for complaints about arguments.

export const USAGE = {
  demo: "demo [--to FOLDER]",
  run: "run NOTEBOOK... [--to FILE|FOLDER] [--digits N] [--limit SECONDS] [--confined]",
  check: "check NOTEBOOK... [--digits N] [--limit SECONDS] [--report FILE] [--confined]",
  export: "export NOTEBOOK [--as html|latex|ts] [--to FILE]",
  dossier: "dossier NOTEBOOK [--to FILE]",
  install: "install [--at DIR | --everyone] [--name NAME] [--set VARIABLE=VALUE]...",
  remove: "remove [--at DIR | --everyone] [--name NAME]",
  diagnose: "diagnose",
} as const;
