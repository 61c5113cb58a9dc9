// What a cell finds under `figure`.
export { curve } from "./curve-figure.ts";
