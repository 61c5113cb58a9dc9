// A drawing as a PDF of one page that TeX takes in: outlines only, since its labels are set by TeX in the paper's own face.
import { zlibSync } from "fflate";
import type { Drawing, Ink, Shape, Step } from "./drawing.ts";

/** The file; the same bytes for the same drawing. */
export function drawingPdf({ width, height, shapes }: Drawing): Uint8Array {
  const inks = shapes.flatMap(({ fill, stroke }) => [fill, stroke].filter((ink) => ink !== undefined));
  const opacities = [...new Set(inks.map(({ opacity }) => opacity))];
  const body = shapes.map((shape) => shapeContent(shape, opacities)).join("");
  // PDF counts upward, the drawing downward.
  const content = zlibSync(new TextEncoder().encode(`1 0 0 -1 0 ${short(height)} cm 1 j\n${body}`));
  const states = opacities.map((opacity, k) => `/A${k} << /ca ${short(opacity)} /CA ${short(opacity)} >>`).join(" ");
  return file([
    "<< /Type /Catalog /Pages 2 0 R >>",
    "<< /Type /Pages /Kids [3 0 R] /Count 1 >>",
    `<< /Type /Page /Parent 2 0 R /MediaBox [0 0 ${short(width)} ${short(height)}] /Contents 4 0 R /Resources << /ExtGState << ${states} >> >> >>`,
    { dictionary: `<< /Length ${content.length} /Filter /FlateDecode >>`, content },
  ]);
}

type PdfObject = string | { readonly dictionary: string; readonly content: Uint8Array };

/** Header, objects, the table of their places, trailer. */
function file(objects: readonly PdfObject[]): Uint8Array {
  const parts: Uint8Array[] = [];
  const places: number[] = [];
  let length = 0;
  const put = (part: string | Uint8Array): void => {
    const bytes = typeof part === "string" ? Buffer.from(part, "latin1") : part;
    parts.push(bytes);
    length += bytes.length;
  };
  put("%PDF-1.4\n");
  objects.forEach((object, k) => {
    places.push(length);
    put(`${k + 1} 0 obj\n`);
    if (typeof object === "string") put(object);
    else for (const part of [`${object.dictionary}\nstream\n`, object.content, "\nendstream"]) put(part);
    put("\nendobj\n");
  });
  const table = places.map((place) => `${String(place).padStart(10, "0")} 00000 n \n`).join("");
  const count = objects.length + 1;
  put(
    `xref\n0 ${count}\n0000000000 65535 f \n${table}trailer\n<< /Size ${count} /Root 1 0 R >>\nstartxref\n${length}\n%%EOF\n`,
  );
  return Buffer.concat(parts);
}

function shapeContent(shape: Shape, opacities: readonly number[]): string {
  const { fill, stroke, width, dashes, round, outline } = shape;
  const path = outline.map(stepContent).join("");
  const state = (ink: Ink): string => `/A${opacities.indexOf(ink.opacity)} gs `;
  const filled = fill ? `${state(fill)}${color(fill)} rg\n${path}f\n` : "";
  const pen = `${short(width)} w ${round ? 1 : 0} J [${dashes.map(short).join(" ")}] 0 d`;
  return filled + (stroke ? `${state(stroke)}${color(stroke)} RG ${pen}\n${path}S\n` : "");
}

function color({ red, green, blue }: Ink): string {
  return [red, green, blue].map(short).join(" ");
}

function stepContent(step: Step): string {
  switch (step.kind) {
    case "move":
      return `${numbers(step.to)} m\n`;
    case "line":
      return `${numbers(step.to)} l\n`;
    case "curve":
      return `${numbers(step.by[0])} ${numbers(step.by[1])} ${numbers(step.to)} c\n`;
    case "close":
      return "h\n";
  }
}

function numbers([x, y]: readonly [number, number]): string {
  return `${short(x)} ${short(y)}`;
}

/** Three places behind the point: a thousandth of a point is finer than any printer. */
function short(x: number): string {
  return String(Math.round(x * 1000) / 1000);
}
