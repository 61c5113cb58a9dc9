// Our own figures read back from their SVG: strokes, fills and labels, as a vector file and TeX take them. A picture that holds
// anything else (other elements, transformations, style sheets, images) is not read: it is for a converter of SVG.

/** Ink of a shape: how dark and how dense a line or an area is. */
export interface Ink {
  readonly red: number;
  readonly green: number;
  readonly blue: number;
  readonly opacity: number;
}

export interface Shape {
  /** Steps of the outline: to a point, along a line, along a cubic curve; "close" leads back. Upright, y downward. */
  readonly outline: readonly Step[];
  readonly fill: Ink | undefined;
  readonly stroke: Ink | undefined;
  readonly width: number;
  readonly dashes: readonly number[];
  readonly round: boolean;
}

export type Step =
  | { readonly kind: "move" | "line"; readonly to: Place }
  | { readonly kind: "curve"; readonly by: readonly [Place, Place]; readonly to: Place }
  | { readonly kind: "close" };

export type Place = readonly [x: number, y: number];

export interface Run {
  readonly text: string;
  readonly italic: boolean;
  readonly low: boolean;
}

export interface Label {
  readonly at: Place;
  readonly anchor: "start" | "middle" | "end";
  readonly size: number;
  readonly runs: readonly Run[];
}

export interface Drawing {
  readonly width: number;
  readonly height: number;
  readonly shapes: readonly Shape[];
  readonly labels: readonly Label[];
}

/** The drawing of an SVG of ours; undefined for any other. */
export function readDrawing(svg: string): Drawing | undefined {
  try {
    return new Reader(svg).read();
  } catch (error) {
    if (error instanceof Foreign) return undefined;
    throw error;
  }
}

/** Something that our figures do not hold. */
class Foreign extends Error {}

type Attributes = Readonly<Record<string, string>>;

const TAG = /<(\/?)([a-zA-Z]+)((?:\s+[\w:-]+="[^"<]*")*)\s*(\/?)>|([^<]+)/y;
const ATTRIBUTE = /([\w:-]+)="([^"<]*)"/g;
/** What a shape has from the elements around it. */
const INHERITED = ["fill", "stroke", "stroke-width", "stroke-dasharray", "stroke-linecap", "font-size", "font-style"];
/** What changes nothing that is drawn. */
const SILENT = /^(?:xmlns|viewBox|role|style|class|id|font-family|xml:space|aria-[a-z]+)$/;
const KNOWN =
  /^(?:width|height|d|x|y|cx|cy|r|dy|text-anchor|opacity|fill-opacity|stroke-opacity|stroke-linejoin|font-weight)$/;

class Reader {
  readonly #svg: string;
  readonly #open: { readonly tag: string; readonly style: Attributes; readonly own: Attributes }[] = [];
  readonly #shapes: Shape[] = [];
  readonly #labels: Label[] = [];
  #runs: Run[] = [];
  #size: Place | undefined;

  constructor(svg: string) {
    this.#svg = svg.trim();
  }

  read(): Drawing {
    TAG.lastIndex = 0;
    for (let at = 0; at < this.#svg.length; at = TAG.lastIndex) {
      TAG.lastIndex = at;
      const match = TAG.exec(this.#svg);
      if (!match) throw new Foreign();
      const [, closing, tag = "", attributes = "", empty, text] = match;
      if (text !== undefined) this.#text(text);
      else if (closing) this.#close(tag);
      else this.#element(tag, attributesOf(attributes), empty === "/");
    }
    const [width, height] = this.#size ?? [];
    if (width === undefined || height === undefined || this.#open.length > 0) throw new Foreign();
    return { width, height, shapes: this.#shapes, labels: this.#labels };
  }

  #element(tag: string, own: Attributes, empty: boolean): void {
    const style = inherited(this.#open.at(-1)?.style ?? {}, own);
    if (tag === "svg" && this.#open.length === 0) this.#size = [number(own.width), number(own.height)];
    else if (this.#open.length === 0) throw new Foreign();
    else if (tag === "path") this.#shapes.push(shape(outlineOf(own.d ?? ""), style, own));
    else if (tag === "circle") this.#shapes.push(shape(circle(own), style, own));
    else if (tag === "rect") this.#paper(own);
    else if (tag === "text") this.#runs = [];
    else if (!/^(?:g|tspan|title|desc|style)$/.test(tag)) throw new Foreign();
    if (!empty) this.#open.push({ tag, style, own });
  }

  /** The paper behind a drawing is not printed; our figures have no other rectangle. */
  #paper({ class: name, fill }: Attributes): void {
    if (name !== "paper" || fill !== "none") throw new Foreign();
  }

  #text(text: string): void {
    const { tag = "", style = {} as Attributes } = this.#open.at(-1) ?? {};
    if (tag === "title" || tag === "desc") return;
    // The one style sheet of a figure gives its paper and ink where it stands alone.
    if (
      tag === "style" ? /^(?:@media print\{|svg:root|[ .{}:;#\w])*$/.test(text) : text.trim() === "" && tag !== "tspan"
    )
      return;
    if (tag !== "text" && tag !== "tspan") throw new Foreign();
    const low = Number(style["font-size"]) < 0.9 * Number(this.#fontSize());
    this.#runs.push({ text: decoded(text), italic: style["font-style"] === "italic", low });
  }

  #fontSize(): string {
    return this.#open.findLast(({ tag }) => tag === "text")?.style["font-size"] ?? "15";
  }

  #close(tag: string): void {
    const last = this.#open.pop();
    if (last?.tag !== tag) throw new Foreign();
    if (tag !== "text") return;
    const anchor = last.own["text-anchor"] ?? "start";
    if (anchor !== "start" && anchor !== "middle" && anchor !== "end") throw new Foreign();
    const at: Place = [number(last.own.x), number(last.own.y)];
    this.#labels.push({ at, anchor, size: number(last.style["font-size"]), runs: this.#runs });
  }
}

function attributesOf(source: string): Attributes {
  const found: Record<string, string> = {};
  for (const [, name = "", value = ""] of source.matchAll(ATTRIBUTE)) {
    if (SILENT.test(name) && name !== "class") continue;
    if (name !== "class" && !KNOWN.test(name) && !INHERITED.includes(name)) throw new Foreign();
    found[name] = value;
  }
  return found;
}

/** The style inside an element; opacities multiply. */
function inherited(outer: Attributes, own: Attributes): Attributes {
  const taken = INHERITED.flatMap((name) => {
    const value = own[name] ?? outer[name];
    return value === undefined ? [] : [[name, value]];
  });
  const opacity = number(outer.opacity ?? "1") * number(own.opacity ?? "1");
  return { ...Object.fromEntries(taken), opacity: String(opacity) };
}

function shape(outline: readonly Step[], style: Attributes, own: Attributes): Shape {
  return {
    outline,
    fill: ink(style.fill, number(style.opacity) * number(own["fill-opacity"] ?? "1")),
    stroke: ink(style.stroke, number(style.opacity) * number(own["stroke-opacity"] ?? "1")),
    width: number(style["stroke-width"] ?? "1"),
    dashes: (style["stroke-dasharray"] ?? "")
      .split(/[\s,]+/)
      .filter((part) => part !== "")
      .map(number),
    round: style["stroke-linecap"] === "round",
  };
}

function ink(paint: string | undefined, opacity: number): Ink | undefined {
  if (paint === undefined || paint === "none") return undefined;
  if (paint === "currentColor") return { red: 0, green: 0, blue: 0, opacity };
  const [, ...parts] = /^#([\da-f]{2})([\da-f]{2})([\da-f]{2})$/i.exec(paint) ?? [];
  if (parts.length !== 3) throw new Foreign();
  const [red = 0, green = 0, blue = 0] = parts.map((part) => Number.parseInt(part, 16) / 255);
  return { red, green, blue, opacity };
}

function number(text: string | undefined): number {
  if (text === undefined || !/^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/i.test(text)) throw new Foreign();
  return Number(text);
}

/** M, L, H and V in both forms, and Z: what our paths are made of. */
function outlineOf(d: string): Step[] {
  const steps: Step[] = [];
  let [x, y] = [0, 0];
  for (const [, letter = "", rest = ""] of d.matchAll(/([a-zA-Z])([^a-zA-Z]*)/g)) {
    const numbers = (rest.match(/[+-]?(?:\d+\.?\d*|\.\d+)/g) ?? []).map(Number);
    if (rest.replace(/[+-]?(?:\d+\.?\d*|\.\d+)|[\s,]/g, "") !== "") throw new Foreign();
    const [dx, dy] = letter === letter.toLowerCase() ? [x, y] : [0, 0];
    const command = letter.toUpperCase();
    if (command === "Z") steps.push({ kind: "close" });
    else if (command === "H") x = dx + (numbers[0] ?? Number.NaN);
    else if (command === "V") y = dy + (numbers[0] ?? Number.NaN);
    else if (command === "M" || command === "L")
      [x, y] = [dx + (numbers[0] ?? Number.NaN), dy + (numbers[1] ?? Number.NaN)];
    else throw new Foreign();
    const expected = command === "Z" ? 0 : command === "H" || command === "V" ? 1 : 2;
    if (numbers.length !== expected) throw new Foreign();
    if (expected > 0) steps.push({ kind: command === "M" ? "move" : "line", to: [x, y] });
  }
  return steps;
}

/** Handles of a quarter of a circle by a cubic curve; off by 0.03 % of the radius. */
const QUARTER = 0.5523;

function circle({ cx, cy, r }: Attributes): Step[] {
  const [x, y, radius] = [number(cx), number(cy), number(r)];
  const at = (a: number, b: number): Place => [x + a * radius, y + b * radius];
  const corners: readonly Place[] = [
    [1, 0],
    [0, 1],
    [-1, 0],
    [0, -1],
    [1, 0],
  ];
  const curves = corners.slice(1).map(([a, b], k): Step => {
    const [c, d] = corners[k]!;
    return {
      kind: "curve",
      by: [at(c + QUARTER * a, d + QUARTER * b), at(a + QUARTER * c, b + QUARTER * d)],
      to: at(a, b),
    };
  });
  return [{ kind: "move", to: at(1, 0) }, ...curves, { kind: "close" }];
}

const ENTITIES: Readonly<Record<string, string>> = { lt: "<", gt: ">", quot: '"', amp: "&" };

function decoded(text: string): string {
  return text.replace(/&(?:#(\d+)|(\w+));/g, (_, code: string | undefined, name: string) =>
    code === undefined ? (ENTITIES[name] ?? "") : String.fromCodePoint(Math.min(Number(code), 0x10ffff)),
  );
}
