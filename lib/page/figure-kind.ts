import type { Figure } from "../figure/figure.ts";
import type { Kind } from "./kind.ts";

export const figureKind: Kind<Figure> = {
  text: (figure) => `figure: ${figure.alt}`,
  svg: (figure) => figure.svg,
  data: (figure) => ({ kind: "figure", ...figure.data }),
};
