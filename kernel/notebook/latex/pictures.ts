// Pictures of a paper as files that TeX can take in. Our own figures become vector PDF here; any other SVG does by rsvg-convert,
// which is free on every system; where that is missing the SVG itself is put beside, with what to do.
import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { sanitise } from "../page/sanitise.ts";
import type { Picture } from "./document.ts";
import { drawingPdf } from "./vector.ts";

/** The program that makes a PDF of an SVG. */
export const CONVERTER = "rsvg-convert";

export interface PictureFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

export interface PictureFiles {
  readonly files: readonly PictureFile[];
  /** What the user has to do for the pictures to appear; undefined: nothing. */
  readonly advice?: string;
}

/** The files of a paper's pictures; without a converter SVG stays SVG. */
export function pictureFiles(pictures: readonly Picture[], converter: string | undefined = undefined): PictureFiles {
  const files: PictureFile[] = [];
  const left: string[] = [];
  for (const { name, mime, data, drawing } of pictures) {
    if (drawing) {
      files.push({ name: `${name}.pdf`, bytes: drawingPdf(drawing) });
      continue;
    }
    if (mime !== "image/svg+xml") {
      files.push({ name: `${name}.${mime === "image/png" ? "png" : "jpg"}`, bytes: Buffer.from(data, "base64") });
      continue;
    }
    // What a stranger's notebook calls a picture must not make the converter read files or addresses.
    const svg = Buffer.from(withoutPaper(withNamespace(sanitise(data))));
    const pdf = converter === undefined ? undefined : toPdf(svg, converter);
    if (!pdf) left.push(name);
    files.push(pdf ? { name: `${name}.pdf`, bytes: pdf } : { name: `${name}.svg`, bytes: svg });
  }
  if (left.length === 0) return { files };
  const advice = `no ${converter ?? CONVERTER} here, so figures are SVG; before LaTeX make a PDF of each:\n${left
    .map((name) => `  rsvg-convert -f pdf -o ${name}.pdf ${name}.svg`)
    .join("\n")}\n(rsvg-convert comes with librsvg: Debian librsvg2-bin, Homebrew librsvg)`;
  return { files, advice };
}

/** The tint of a screen is no ink. */
function withoutPaper(svg: string): string {
  return svg.replace(/svg:root \.paper\{fill:#[0-9a-fA-F]+\}/g, "");
}

function withNamespace(svg: string): string {
  return /^\s*<svg[^>]*\sxmlns=/.test(svg) ? svg : svg.replace(/<svg\b/, '<svg xmlns="http://www.w3.org/2000/svg"');
}

function toPdf(svg: Buffer, converter: string): Buffer | undefined {
  const folder = mkdtempSync(path.join(os.tmpdir(), "halfperiod-figure-"));
  try {
    const [source, target] = [path.join(folder, "figure.svg"), path.join(folder, "figure.pdf")];
    writeFileSync(source, svg);
    // A date in the file would make two exports of one notebook differ.
    const env = { ...process.env, SOURCE_DATE_EPOCH: "0" };
    const { status } = spawnSync(converter, ["-f", "pdf", "-o", target, source], { env, timeout: 60_000 });
    return status === 0 ? readFileSync(target) : undefined;
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
