import { conventionHtml } from "./convention.ts";
import type { Kind } from "./kind.ts";
import type { Table } from "./table.ts";
import { tableHtml } from "./table-html.ts";
import { tableTex } from "./table-tex.ts";
import { tableText } from "./table-text.ts";

export const tableKind: Kind<Table> = {
  text: tableText,
  tex: tableTex,
  html: (table, show) => `${tableHtml(table, show)}${conventionHtml(show.conventions(table))}`,
  conventions: (table, show) => table.rows.flatMap((row) => row.flatMap((value) => show.conventions(value))),
  data: (table, show) => ({
    kind: "table",
    columns: table.columns,
    rows: table.rows.map((row) => row.map((value) => show.data(value))),
  }),
};
