// A table as HTML that reads everywhere, in front ends too that typeset no formulas inside HTML: digits are text in figures of equal
// width and are copied ungrouped; formulas are text with indices and powers.

import { type Decimal, fractionGroups, inLines, integerGroups } from "./digits.ts";
import { formulaHtml } from "./formula/write.ts";
import { escapeHtml } from "./html.ts";
import type { Cell, NumberCell, Show } from "./kind.ts";
import { htmlFormulas } from "./plain-formula.ts";
import type { Table } from "./table.ts";
import { bothParts, type Column, type NumberWidths } from "./table-column.ts";
import { SHORT_WORDS } from "./table-fit.ts";
import { layout } from "./table-layout.ts";
import { texName } from "./tex.ts";

const RULE = "1px solid currentColor";
const STYLE = {
  table: `table-layout:auto;width:auto;font-size:inherit;border-collapse:collapse;border:0;border-top:${RULE};border-bottom:${RULE};font-variant-numeric:tabular-nums lining-nums;margin:.4em 0`,
  caption: "caption-side:top;text-align:left;padding:0 .6em .4em 0;color:inherit",
  head: `text-align:left;vertical-align:bottom;padding:.25em 1.2em .25em 0;border:0;border-bottom:${RULE};font-weight:normal`,
  cell: "text-align:left;vertical-align:baseline;padding:.2em 1.2em .2em 0;border:0;white-space:nowrap;font-weight:normal",
  words: "text-align:left;vertical-align:baseline;padding:.2em 1.2em .2em 0;border:0;font-weight:normal",
} as const;

export function tableHtml(table: Table, show: Show): string {
  const { columns, rows, omitted, fits } = layout(table, show);
  const caption =
    table.caption === "" ? "" : `<caption style="${STYLE.caption}">${htmlFormulas(table.caption)}</caption>`;
  const named = columns.some(({ head }) => head !== "");
  const heads = columns.map(({ head }) => `<th scope="col" style="${STYLE.head}">${headHtml(head)}</th>`);
  const rowHeads = rows.length > 0 && rows.every((row) => row[0] && row[0].kind !== "number" && row[0].text !== "");
  const body = rows.map(
    (row) =>
      `<tr style="background:none">${columns.map((column, k) => cell(row[k], column, { isHead: rowHeads && k === 0, fits })).join("")}</tr>`,
  );
  const rest =
    omitted > 0 ? `<tr><td colspan="${columns.length}" style="${STYLE.words}">... ${omitted} more rows</td></tr>` : "";
  const head = named ? `<thead><tr>${heads.join("")}</tr></thead>` : "";
  return `<div style="overflow-x:auto"><table style="${STYLE.table}">${caption}${head}<tbody>${body.join("")}${rest}</tbody></table></div>`;
}

function headHtml(head: string): string {
  if (head.includes("$")) return htmlFormulas(head);
  return formulaHtml(texName(head)) ?? escapeHtml(head);
}

function cell(
  content: Cell | undefined,
  column: Column,
  { isHead, fits }: { readonly isHead: boolean; readonly fits: boolean },
): string {
  if (!content || content.kind === "words") {
    const text = content?.text ?? "";
    const style = fits && text.length <= SHORT_WORDS ? `${STYLE.words};white-space:nowrap` : STYLE.words;
    return tableCell(wordsHtml(text), style, isHead);
  }
  if (content.kind === "formula") return tableCell(formulaCell(content), STYLE.cell, isHead);
  return tableCell(numberHtml(content, column), STYLE.cell, isHead);
}

/** A formula in a line; one that needs several, such as a matrix, stands as its text. */
function formulaCell({ text, tex }: Extract<Cell, { kind: "formula" }>): string {
  return formulaHtml(tex) ?? escapeHtml(text).replace(/\n/g, "<br>");
}

/** Words, with the digits behind a Greek letter as its index, fields and minus signs as in formulas. */
function wordsHtml(text: string): string {
  return htmlFormulas(text)
    .replace(/(\p{Script=Greek})(\d+)/gu, "<i>$1</i><sub>$2</sub>")
    .replace(/\bE\(F_(\d+)\)/g, "<i>E</i>(<b>F</b><sub>$1</sub>)")
    .replace(/(?<=[ (])-(?=\d)/g, "−");
}

function tableCell(html: string, style: string, isHead: boolean): string {
  return isHead
    ? `<th scope="row" style="${style};white-space:nowrap">${html}</th>`
    : `<td style="${style}">${html}</td>`;
}

function numberHtml({ re, im }: NumberCell, column: Column): string {
  const { groups } = column;
  const first = re ? decimalHtml(re, column.re, groups) : "";
  if (!im) return first;
  if (!column.stacked) {
    const sign = im.negative ? "−" : "+";
    const joint = re ? ` ${sign} ` : im.negative ? "−" : "";
    const second = decimalHtml({ ...im, negative: false }, column.im && { ...column.im, signed: false }, groups);
    return `${first}${joint}${second} <i>i</i>`;
  }
  const common = bothParts(column);
  const above = re ? `${decimalHtml(re, common, groups)}<br>` : "";
  return `${above}${decimalHtml(im, common, groups, im.negative ? "−" : re ? "+" : "")} <i>i</i>`;
}

function decimalHtml(
  decimal: Decimal,
  widths: NumberWidths | undefined,
  groups: number,
  sign = decimal.negative ? "−" : "",
): string {
  const room = widths ? widths.integer + (widths.signed ? 1 : 0) : 0;
  const [start = [], ...rest] = inLines(fractionGroups(decimal.fraction), groups);
  const whole = padded(`${sign}${spaced(integerGroups(decimal.integer))}`, room);
  const lines = rest.map((line) => `<br>${padded("", Math.max(1, room))}${HIDDEN_POINT}${spaced(line)}`);
  const fraction = start.length === 0 ? "" : `.${spaced(start)}${lines.join("")}`;
  const dots = decimal.continues ? "..." : "";
  const power = decimal.exponent === 0 ? "" : ` · 10<sup>${String(decimal.exponent).replace("-", "−")}</sup>`;
  const radius = decimal.radius === undefined ? "" : radiusHtml(decimal, widths);
  return `${whole}${fraction}${dots}${power}${radius}`;
}

/** Where a number goes on in a further line, its digits stand under the first ones behind the point. */
const HIDDEN_POINT = '<span style="visibility:hidden">.</span>';

/** Set flush right in room for so many digits: one ch is the width of the digit 0, in any face with equal figures. */
function padded(html: string, room: number): string {
  if (room <= 1 && html !== "") return `<span>${html}</span>`;
  return `<span style="display:inline-block;min-width:${room}ch;text-align:right">${html}</span>`;
}

function radiusHtml(decimal: Decimal, widths: NumberWidths | undefined): string {
  const missing = Math.max(0, (widths?.fraction ?? 0) - decimal.fraction.length);
  const blank = missing === 0 ? "" : `<span style="display:inline-block;width:${missing}ch"></span>`;
  const [mantissa = "", power] = (decimal.radius ?? "").split("e");
  const times = mantissa === "1" ? "" : `${mantissa} · `;
  return `${blank} ± ${power === undefined ? mantissa : `${times}10<sup>${power.replace("-", "−")}</sup>`}`;
}

/** Groups set apart by space that is not copied. */
function spaced(groups: readonly string[]): string {
  const [first = "", ...rest] = groups;
  return first + rest.map((group) => `<span style="margin-left:.18em">${group}</span>`).join("");
}
