// The names that a cell sees. Each comes from the file that says what it does; keep the groups, one line a file.

// Pages
export { Figure } from "./figure/figure.ts";
export { type Row, Table, type TableOptions, table } from "./page/table.ts";
export { tex, typeset } from "./page/typeset.ts";
