// SVG as data: nodes are built, never strings glued, so that text is escaped in one place.

export interface SvgNode {
  readonly tag: string;
  readonly attributes: Readonly<Record<string, string>>;
  readonly children: readonly (SvgNode | string)[];
}

type AttributeValue = string | number | undefined;

/** One element; numbers are rounded to a hundredth of a pixel, undefined attributes are left out. */
export function node(
  tag: string,
  attributes: Readonly<Record<string, AttributeValue>> = {},
  ...children: readonly (SvgNode | string)[]
): SvgNode {
  const kept: Record<string, string> = {};
  for (const [name, value] of Object.entries(attributes)) {
    if (value !== undefined) kept[name] = typeof value === "number" ? short(value) : value;
  }
  return { tag, attributes: kept, children };
}

/** Shortest decimal of a pixel coordinate, two places. Infinite or NaN coordinates are a fault of the caller. */
export function short(x: number): string {
  if (!Number.isFinite(x)) throw new RangeError(`figure: coordinate ${x} is not finite`);
  const rounded = Math.round(x * 100) / 100;
  return String(rounded === 0 ? 0 : rounded);
}

export function escapeXml(text: string): string {
  return (
    text
      // Control characters other than tab and line ends are not allowed in XML, not even escaped.
      // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is removed here
      .replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]/g, "\ufffd")
      .replace(/&/g, "&amp;")
      .replace(/</g, "&lt;")
      .replace(/>/g, "&gt;")
      .replace(/"/g, "&quot;")
      .replace(/'/g, "&#39;")
  );
}

/** Text of a node and all that is in it. */
export function serialize(root: SvgNode): string {
  const attributes = Object.entries(root.attributes).map(([name, value]) => ` ${name}="${escapeXml(value)}"`);
  const open = `<${root.tag}${attributes.join("")}`;
  if (root.children.length === 0) return `${open}/>`;
  const inner = root.children.map((child) => (typeof child === "string" ? escapeXml(child) : serialize(child)));
  return `${open}>${inner.join("")}</${root.tag}>`;
}

/** Path data through the points, in pixels; `closed` joins the last to the first. */
export function pathData(points: readonly (readonly [number, number])[], closed = false): string {
  const steps = points.map(([x, y], index) => `${index === 0 ? "M" : "L"}${short(x)},${short(y)}`);
  return steps.join("") + (closed ? "Z" : "");
}
