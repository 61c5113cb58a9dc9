import { pageHost } from "./host.ts";
import { escapeHtml } from "./html.ts";

/** A count that a page shows while it grows. */
export interface Progress {
  /** Counts `steps` more, one if nothing is said. */
  advance(steps?: number): void;
  /** Shows the count as it is now, even if it was shown a moment ago. */
  finish(): void;
}

const WIDTH = 30;
/** Time between two pictures of the bar: quicker than that no eye follows. */
const PAUSE_MS = 100;

/**
 * Shows how far a loop has come: `for (const p of progress(primes)) ...`, or `const bar = progress({ of: 40 })` and
 * `bar.advance()`. The bar is one display that changes; its text is what a terminal shows.
 */
export function progress<T>(list: Iterable<T>): Generator<T, void, undefined>;
export function progress(count: { readonly of: number }): Progress;
export function progress<T>(what: Iterable<T> | { readonly of: number }): Generator<T, void, undefined> | Progress {
  return Symbol.iterator in what ? counted(what) : new Bar(what.of);
}

function* counted<T>(list: Iterable<T>): Generator<T, void, undefined> {
  const bar = new Bar(sizeOf(list));
  try {
    for (const item of list) {
      yield item;
      bar.advance();
    }
  } finally {
    bar.finish();
  }
}

function sizeOf(list: Iterable<unknown>): number | undefined {
  const { length, size } = list as { length?: unknown; size?: unknown };
  const known = typeof length === "number" ? length : size;
  return typeof known === "number" ? known : undefined;
}

class Bar implements Progress {
  readonly #total: number | undefined;
  readonly #id = `progress-${crypto.randomUUID()}`;
  #count = 0;
  #shownAt = Number.NEGATIVE_INFINITY;
  #shown = false;

  constructor(total: number | undefined) {
    this.#total = total;
    this.#show();
  }

  advance(steps = 1): void {
    this.#count += steps;
    if (Date.now() - this.#shownAt >= PAUSE_MS || this.#count === this.#total) this.#show();
  }

  finish(): void {
    this.#show();
  }

  #show(): void {
    this.#shownAt = Date.now();
    const text = barText(this.#count, this.#total);
    const bundle = { "text/plain": text, "text/html": barHtml(this.#count, this.#total) };
    pageHost().display(bundle, { displayId: this.#id, ...(this.#shown && { update: true }) });
    this.#shown = true;
  }
}

/** "■■■■■■□□□□ 24 of 40", or the count alone. */
function barText(count: number, total: number | undefined): string {
  if (total === undefined) return `${count} so far`;
  const full = total > 0 ? Math.min(WIDTH, Math.max(0, Math.round((WIDTH * count) / total))) : WIDTH;
  return `${"■".repeat(full)}${"□".repeat(WIDTH - full)} ${count} of ${total}`;
}

function barHtml(count: number, total: number | undefined): string {
  const label = total === undefined ? `${count} so far` : `${count} of ${total}`;
  const value = total === undefined ? "" : ` value="${count}" max="${total}"`;
  return `<progress${value} aria-label="progress"></progress> ${escapeHtml(label)}`;
}
