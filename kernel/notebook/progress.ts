// How far a run is: one line that redraws itself on a terminal, one line a cell in a log.
import type { CellReport, RunEvents } from "./run.ts";

export interface Screen {
  readonly isTTY?: boolean;
  readonly columns?: number;
  write(text: string): unknown;
}

export interface Progress extends RunEvents {
  /** Takes the line away, so that other text can follow. */
  end(): void;
}

const REDRAW = 120;
const WIDTH = 24;

/** Progress of one notebook's run, for a person who waits. */
export function showProgress(name: string, screen: Screen): Progress {
  return screen.isTTY ? barOn(screen, name) : logOn(screen, name);
}

function logOn(screen: Screen, name: string): Progress {
  let total = 0;
  return {
    onCell(_, cells) {
      total = cells;
    },
    onReport(report) {
      screen.write(`${name}: cell ${report.position} of ${total}, ${outcome(report)}\n`);
    },
    end() {},
  };
}

function outcome({ status, duration }: CellReport): string {
  const time = seconds(duration);
  return status === "ok" ? time : `${status} after ${time}`;
}

export function seconds(milliseconds: number): string {
  return `${(milliseconds / 1000).toFixed(milliseconds < 9950 ? 2 : 0)} s`;
}

function barOn(screen: Screen, name: string): Progress {
  let state = { done: 0, total: 1, source: "", since: performance.now() };
  const draw = () => screen.write(`\r\u001B[K${line(name, state, screen.columns ?? 80)}`);
  const timer = setInterval(draw, REDRAW);
  timer.unref();
  return {
    onCell(position, total, source) {
      state = { ...state, done: position - 1, total, source };
      draw();
    },
    onReport({ position }) {
      state = { ...state, done: position };
      draw();
    },
    end() {
      clearInterval(timer);
      screen.write("\r\u001B[K");
    },
  };
}

interface State {
  readonly done: number;
  readonly total: number;
  readonly source: string;
  readonly since: number;
}

/** Name, a rule that fills from the left, cells done, time, and the line of code that runs. */
function line(name: string, { done, total, source, since }: State, columns: number): string {
  const filled = Math.round((WIDTH * done) / total);
  const rule = "─".repeat(Math.max(0, filled - 1)) + (filled > 0 ? "●" : "") + "·".repeat(WIDTH - filled);
  const head = `${name}  ${rule}  ${done} of ${total}  ${seconds(performance.now() - since)}  `;
  const code =
    done < total ? (source.split("\n").findLast((text) => /\w/.test(text) && !/^\s*\/\//.test(text)) ?? "") : "";
  return (head + code.trim()).slice(0, Math.max(20, columns - 1));
}
