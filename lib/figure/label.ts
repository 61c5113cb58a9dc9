import { node, type SvgNode } from "./svg.ts";

/** A piece of a label as it is set: letters of quantities italic, words, digits and signs upright, indices low. */
interface Run {
  readonly text: string;
  readonly italic: boolean;
  readonly low: boolean;
}

const TOKEN = /\s+|_\{[^}]*\}|_[^\s{]|(?<=(?<!\p{L})\p{L})\d+|\p{L}[\p{L}′']*|[^\s_\p{L}]+|_/gu;

function runs(label: string, low = false): Run[] {
  return [...label.matchAll(TOKEN)].flatMap(({ 0: token, index: at }) => {
    if (!low && token.length > 1 && token.startsWith("_")) return runs(token.replace(/^_\{?|\}$/g, ""), true);
    // Digits right behind a single letter are its index: ω1, P12.
    if (!low && /^\d+$/.test(token) && /(?<!\p{L})\p{L}$/u.test(label.slice(0, at)))
      return [{ text: token, italic: false, low: true }];
    if (/^\p{L}/u.test(token)) return [{ text: token, italic: /^\p{L}[′']*$/u.test(token), low }];
    return [{ text: token.replace(/-/g, "−"), italic: false, low }];
  });
}

/** The label as words: "ω_1" is read as "ω1". */
export function spoken(label: string): string {
  return label.replace(/_\{([^}]*)\}|_/g, "$1");
}

/** Width of a label in pixels, estimated from the usual widths of a serif face; used only to keep labels apart. */
export function labelWidth(label: string, size = 15): number {
  return runs(label).reduce((sum, run) => sum + [...run.text].length * size * (run.low ? 0.36 : 0.52), 0);
}

/** A label such as "ω1", "z_P", "P + Q", "Re z" or "-R" as a text node, the text starting at (x, y) on its base line. */
export function mathLabel(
  label: string,
  x: number,
  y: number,
  options: { readonly anchor?: "start" | "middle" | "end"; readonly size?: number } = {},
): SvgNode {
  const size = options.size ?? 15;
  const pieces: SvgNode[] = [];
  let shifted = false;
  for (const run of runs(label)) {
    const dy = run.low === shifted ? undefined : run.low ? size * 0.22 : -size * 0.22;
    shifted = run.low;
    pieces.push(
      node(
        "tspan",
        { "font-style": run.italic ? "italic" : undefined, "font-size": run.low ? size * 0.72 : undefined, dy },
        run.text,
      ),
    );
  }
  return node(
    "text",
    {
      x,
      y,
      fill: "currentColor",
      "text-anchor": options.anchor === "start" ? undefined : options.anchor,
      "font-size": options.size,
      "xml:space": "preserve",
    },
    ...pieces,
  );
}
