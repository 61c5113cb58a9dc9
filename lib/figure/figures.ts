// What a cell finds under `figure`.
export { curve } from "./curve-figure.ts";
export { fundamentalDomain } from "./domain-figure.ts";
export { lattice } from "./lattice-figure.ts";
