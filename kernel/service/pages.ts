// What a cell shows aside, as front ends take it: the classic notebook shows one page a reply, its HTML or else its text.
import { escapeHtml } from "../../lib/page/html.ts";
import type { MimeBundle } from "../cell/port.ts";
import type { Json } from "../wire/message.ts";

/** The payload with all its pages in one, which stands where the first was; a figure is HTML too. */
export function onePage(payload: readonly Json[]): readonly Json[] {
  const pages = payload.filter(({ source }) => source === "page");
  const [first, ...others] = pages;
  if (!first) return payload;
  const bundles = pages.map(({ data }) => withFigure(data as MimeBundle));
  const data = others.length === 0 ? bundles[0] : joined(bundles);
  return payload.flatMap((entry) => (entry === first ? [{ ...entry, data }] : others.includes(entry) ? [] : [entry]));
}

function withFigure(data: MimeBundle): MimeBundle {
  const svg = data["image/svg+xml"];
  return typeof svg === "string" && data["text/html"] === undefined ? { ...data, "text/html": svg } : data;
}

function joined(bundles: readonly MimeBundle[]): MimeBundle {
  const text = bundles.map(textOf).join("\n\n");
  if (bundles.every((data) => data["text/html"] === undefined)) return { "text/plain": text };
  const html = bundles.map((data) => `<div>${data["text/html"] ?? `<pre>${escapeHtml(textOf(data))}</pre>`}</div>`);
  return { "text/plain": text, "text/html": html.join("\n") };
}

function textOf(data: MimeBundle): string {
  return String(data["text/plain"] ?? "");
}
