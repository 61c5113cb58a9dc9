// What a cell finds under `figure`.
export { circle } from "./circle-figure.ts";
export { curve } from "./curve-figure.ts";
export { fundamentalDomain } from "./domain-figure.ts";
export { lattice } from "./lattice-figure.ts";
