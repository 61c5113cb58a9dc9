// The conventions that a result used, as lines under it: the words come from the edition, the formulas in them are set.

import { type ConventionKey, convention, conventionOrder } from "../proof/conventions.ts";
import { htmlFormulas } from "./plain-formula.ts";
import { prose } from "./prose.ts";
import { small, texProse } from "./tex.ts";

/** The rows of edition 1 with their formulas in $...$; a row that is missing here is set as words. */
const WITH_FORMULAS: Partial<Record<ConventionKey, string>> = {
  cubic:
    "$\\wp'^2 = 4\\wp^3 - g_2\\wp - g_3$; a long model $[a_1, a_2, a_3, a_4, a_6]$ has $g_2 = c_4/12$, $g_3 = c_6/216$ and $x = \\wp - b_2/12$",
  periods:
    "$\\omega_1, \\omega_2$ are full periods, $\\Lambda = \\mathbb{Z}\\omega_1 + \\mathbb{Z}\\omega_2$, $\\tau = \\omega_2/\\omega_1$ with $\\operatorname{Im} \\tau > 0$; halves are written $\\omega/2$",
  roots:
    "$e_1 = \\wp(\\omega_1/2)$, $e_2 = \\wp((\\omega_1+\\omega_2)/2)$, $e_3 = \\wp(\\omega_2/2)$; $m = (e_2-e_3)/(e_1-e_3)$ and $\\lambda = \\theta_2^4/\\theta_3^4$",
  realBasis:
    "$\\omega_1 > 0$ is the least real period and $\\operatorname{Re} \\omega_2$ is $0$ or $\\omega_1/2$; in it $\\Delta > 0$ gives $e_1 > e_2 > e_3$, and $\\Delta < 0$ gives $e_1$ real, $\\operatorname{Im} e_2 > 0$",
  signOfPeriods:
    "for a lattice that is not real, $\\operatorname{Re} \\omega_1 > 0$, or $\\operatorname{Re} \\omega_1 = 0$ and $\\operatorname{Im} \\omega_1 > 0$",
  fundamentalDomain:
    "$\\operatorname{Re} \\tau$ in $[-\\tfrac12, \\tfrac12)$, $|\\tau| \\ge 1$, and $\\operatorname{Re} \\tau \\le 0$ where $|\\tau| = 1$",
  realPeriod:
    "$\\omega_1$ is the least positive real period; $\\Omega$ = (number of real components) $\\times\\, \\omega_1$ of the minimal differential",
  differential: "$dz = dx/(2y + a_1 x + a_3)$, so $y \\to -\\infty$ as $z \\to 0^+$",
  quasiPeriods:
    "$\\eta_k = \\zeta(z + \\omega_k) - \\zeta(z)$ for full periods, so $\\eta_1 \\omega_2 - \\eta_2 \\omega_1 = 2\\pi i$",
  discriminant:
    "$\\Delta = g_2^3 - 27 g_3^2 = (2\\pi/\\omega_1)^{12} \\eta(\\tau)^{24}$; the polynomial $4x^3 - g_2 x - g_3$ has discriminant $16\\Delta$",
  j: "$j = 1728\\, g_2^3/\\Delta$, so $j(i) = 1728$",
  nome: "$q_\\theta = \\exp(\\pi i \\tau)$ and $q_{\\mathrm{mod}} = \\exp(2\\pi i \\tau)$, always named",
  theta: "{ v } is the argument of $\\sin \\pi v$ and { z } that of $\\sin z$; derivatives are in the named variable",
  modulus: "parameter $m = k^2$, $m_1 = 1 - m$; $\\Pi(n; \\varphi \\mid m)$ has the factor $1 - n \\sin^2 \\varphi$",
  eisenstein:
    "$G_k = \\sum \\omega^{-k}$ over nonzero lattice points; $E_k$ has constant term $1$; $G_2$ names its order of summation",
  height:
    "$\\hat h(P) = \\lim h(x(nP))/n^2$ over $\\mathbb{Q}$; $\\langle P, Q\\rangle = \\tfrac12(\\hat h(P+Q) - \\hat h(P) - \\hat h(Q))$",
  modelChange: "$x = u^2 x' + r$, $y = u^3 y' + s u^2 x' + t$, from the old model to the new",
  isogeny: "normalised (pulls $dz$ back to $dz$) where $\\Lambda \\subset \\Lambda'$; another factor is printed",
  weilPairing: "$e_n(\\omega_1/n, \\omega_2/n) = \\exp(2\\pi i/n)$",
  components: "the identity component contains $O$; the bounded one is $z = \\omega_2/2 + t$, $t$ real",
  branch: "$\\arg$ in $(-\\pi, \\pi]$, the cut belongs to the upper side",
};

/** One line a row, for text; none if nothing needs saying. */
export function conventionText(keys: readonly ConventionKey[]): string[] {
  return conventionOrder(keys).map((key) => `${convention(key).item}: ${convention(key).text}`);
}

/** One line a row, as running text with $formulas$ that HTML and TeX read alike. */
export function conventionProse(keys: readonly ConventionKey[]): string[] {
  return conventionOrder(keys).map(
    (key) => `${convention(key).item}: ${prose(WITH_FORMULAS[key] ?? convention(key).text)}`,
  );
}

/** The same as one quiet block of HTML; empty if nothing needs saying. */
export function conventionHtml(keys: readonly ConventionKey[]): string {
  return noteHtml(conventionProse(keys).map(htmlFormulas));
}

/** Lines of HTML in small type below a result; empty if there are none. */
export function noteHtml(lines: readonly string[]): string {
  return lines.length === 0 ? "" : `<div style="${NOTE}">${lines.map((line) => `<div>${line}</div>`).join("")}</div>`;
}

/** No wider than what it stands below, unless that is narrow: it must not push a table from its place. */
const NOTE =
  "width:0;min-width:max(100%,34em);text-align:left;font-size:.82em;line-height:1.45;opacity:.8;margin:.5em 0 .2em";

/** One line a row, in small type; none if nothing needs saying. */
export function conventionTex(keys: readonly ConventionKey[]): string[] {
  return conventionOrder(keys).map((key) => small(texProse(WITH_FORMULAS[key] ?? convention(key).text)));
}
