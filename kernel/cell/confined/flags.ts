// The second fence: how Node is started for confined cells.

/**
 * Flags for the Node that runs now: no files but one, no processes, workers, addons or inspector; no network where the
 * permission model covers it (elsewhere the realm, which knows no sockets, is the only fence).
 */
export function confinedFlags(bundle: string, memory: number): string[] {
  const has = (flag: string) => process.allowedNodeEnvironmentFlags.has(flag);
  return [
    "--experimental-shadow-realm",
    has("--permission") ? "--permission" : "--experimental-permission",
    `--allow-fs-read=${bundle}`,
    ...(has("--experimental-sqlite") ? ["--no-experimental-sqlite"] : []),
    ...(has("--disable-sigusr1") ? ["--disable-sigusr1"] : []),
    "--disable-warning=ExperimentalWarning",
    // A stray rejection must not reach Node's printing, which would call into the realm.
    "--unhandled-rejections=none",
    `--max-old-space-size=${Math.max(64, Math.floor(memory / 2))}`,
  ];
}
