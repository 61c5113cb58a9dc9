// What ends the kernel from outside: the death of the host, and signals.

/** How often the parent is looked at, in ms: the kernel is to be gone within two seconds of its host. */
const LOOK = 600;

/**
 * Calls `onDeath` once when the process that started this one is gone. Watches only if the host set JPY_PARENT_PID:
 * a host that did not wants the kernel to outlive it. A changed parent is what counts, not parent 1: in a container the
 * host may be process 1, and an orphan may be adopted by another process than 1. `parent` is to be read as early as can
 * be: a host may die while its kernel starts.
 */
export function watchParent(parent: number, onDeath: () => void): void {
  if (!process.env.JPY_PARENT_PID) return;
  const timer = setInterval(() => {
    if (process.ppid === parent && isAlive(parent)) return;
    clearInterval(timer);
    onDeath();
  }, LOOK);
  timer.unref();
}

// Only Windows needs it: there an orphan keeps the number of its dead parent.
function isAlive(pid: number): boolean {
  if (process.platform !== "win32") return true;
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return (error as NodeJS.ErrnoException).code !== "ESRCH";
  }
}

export interface SignalActions {
  readonly interrupt: () => void;
  readonly end: () => void;
}

/**
 * SIGINT interrupts, as an interrupt request does: a terminal sends it to the whole group. SIGTERM and SIGHUP end the
 * kernel in order. SIGUSR1 is taken, as it would open a debugger's port.
 */
export function handleSignals({ interrupt, end }: SignalActions): void {
  process.on("SIGINT", interrupt);
  process.on("SIGTERM", end);
  process.on("SIGHUP", end);
  if (process.platform !== "win32") process.on("SIGUSR1", () => {});
}
