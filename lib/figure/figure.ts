import { node, type SvgNode, serialize } from "./svg.ts";

/** What a figure shows, as data: strings only, so that two runs can be compared without looking at pixels. */
export interface FigureData {
  readonly figure: string;
  readonly [fact: string]: string | readonly string[] | Readonly<Record<string, string>>;
}

export interface FigureParts {
  readonly title: string;
  /** One or two sentences that say in words what the picture shows. */
  readonly description: string;
  readonly width: number;
  readonly height: number;
  readonly body: readonly SvgNode[];
  readonly data: FigureData;
}

/**
 * A picture as a value: an SVG document as text, the same in words, and its facts as data.
 *
 * The drawing takes the ink of the page around it (`currentColor`), so it reads on light and dark pages alike. Where
 * it stands alone, as a file or as an image, it brings its own paper and ink.
 */
export class Figure {
  readonly title: string;
  readonly alt: string;
  readonly svg: string;
  readonly data: FigureData;

  constructor(parts: FigureParts) {
    this.title = parts.title;
    this.alt = `${parts.title}. ${parts.description}`;
    this.data = parts.data;
    this.svg = document(parts);
  }

  toString(): string {
    return `figure: ${this.alt}`;
  }

  toJSON(): FigureData {
    return this.data;
  }
}

// `svg:root` matches only where the drawing is a document of its own (there the page's ink is unknown).
const STANDALONE = "svg:root{color:#1b1b1b}svg:root .paper{fill:#fffefa}@media print{svg:root .paper{fill:none}}";

function document(parts: FigureParts): string {
  const inner = [node("style", {}, STANDALONE), node("rect", PAPER), ...parts.body];
  // Ids come from the content: unique on a page, and the same at each run.
  const id = `fig-${fingerprint(parts.title + parts.description + inner.map(serialize).join(""))}`;
  const { width, height } = parts;
  return serialize(
    node(
      "svg",
      {
        xmlns: "http://www.w3.org/2000/svg",
        viewBox: `0 0 ${width} ${height}`,
        width,
        height,
        role: "img",
        "aria-labelledby": `${id}-title`,
        "aria-describedby": `${id}-desc`,
        style: "max-width:100%;height:auto",
        "font-family": "STIX Two Text, Latin Modern Roman, Libertinus Serif, Times New Roman, Times, serif",
        "font-size": 15,
        fill: "none",
        stroke: "none",
      },
      node("title", { id: `${id}-title` }, parts.title),
      node("desc", { id: `${id}-desc` }, parts.description),
      ...inner,
    ),
  );
}

const PAPER = { class: "paper", width: "100%", height: "100%", fill: "none" } as const;

/** FNV-1a of the text, 32 bits, in base 36. */
function fingerprint(text: string): string {
  let hash = 0x811c9dc5;
  for (let index = 0; index < text.length; index++) {
    hash = Math.imul(hash ^ text.charCodeAt(index), 0x01000193) >>> 0;
  }
  return hash.toString(36);
}
