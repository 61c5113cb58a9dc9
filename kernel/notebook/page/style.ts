// The look of a page: one serif column with wide margins, code beside a thin rule, results set like displayed formulas.
import { readFileSync } from "node:fs";
import { createRequire } from "node:module";

const TEXT = `"STIX Two Text", "Libertinus Serif", "Latin Modern Roman", "Source Serif 4", Charter, "Bitstream Charter", Cambria, Georgia, serif`;
const MATHEMATICS = `"STIX Two Math", "Libertinus Math", "Latin Modern Math", "Cambria Math", math, serif`;
const CODE = `"JetBrains Mono", "Source Code Pro", "DejaVu Sans Mono", ui-monospace, Menlo, Consolas, monospace`;

const LIGHT = "--paper: #fffefa; --ink: #201d18; --soft: #6b655b; --line: #d8d2c4; --link: #24506b; --wrong: #8c2f1b;";
const DARK = "--paper: #17181a; --ink: #e6e2d8; --soft: #a19a8c; --line: #3d3d3c; --link: #9cc4dc; --wrong: #e79a83;";

const SCREEN = `
:root { color-scheme: light dark; ${LIGHT} }
@media (prefers-color-scheme: dark) { :root { ${DARK} } }
* { box-sizing: border-box; }
html { background: var(--paper); color: var(--ink); -webkit-text-size-adjust: 100%; }
body { margin: 0 auto; max-width: 44rem; padding: 5rem 1.5rem 4rem; font: 1.0625rem/1.55 ${TEXT}; font-variant-numeric: lining-nums; }
a { color: var(--link); text-underline-offset: 0.15em; text-decoration-thickness: 0.06em; }
h1, h2, h3, h4 { font-weight: 600; line-height: 1.25; text-wrap: balance; break-after: avoid; }
h1 { font-size: 2rem; font-weight: 500; margin: 0 0 1.4rem; letter-spacing: -0.005em; }
h2 { font-size: 1.3rem; margin: 2.6rem 0 0.7rem; }
h3 { font-size: 1.08rem; font-style: italic; margin: 2rem 0 0.5rem; }
h4 { font-size: 1rem; margin: 1.6rem 0 0.4rem; }
p, ul, ol, blockquote, table, figure, dl { margin: 0 0 1rem; }
p { hyphens: auto; text-wrap: pretty; orphans: 3; widows: 3; }
blockquote { margin-inline: 2rem; color: var(--soft); }
hr { border: 0; border-top: 1px solid var(--line); width: 6rem; margin: 2.5rem auto; }
code, pre { font-family: ${CODE}; font-size: 0.78em; font-variant-ligatures: none; }
pre { line-height: 1.5; margin: 0; tab-size: 2; overflow-x: auto; }
.code pre, pre.shown { white-space: pre-wrap; overflow-wrap: anywhere; }
section.step { margin: 1.5rem 0 1.8rem; }
.code { display: flex; align-items: baseline; gap: 1.2rem; border-left: 1px solid var(--line); padding: 0.1rem 0 0.1rem 1.1rem; margin-left: 0.1rem; }
.code pre { flex: 1; min-width: 0; color: var(--soft); }
pre code { font-size: 1em; }
.code b { font-weight: 600; color: color-mix(in srgb, var(--ink) 75%, var(--soft)); }
.code i { font-style: italic; opacity: 0.85; }
.count { color: var(--soft); font-size: 0.85rem; font-variant-numeric: oldstyle-nums; white-space: nowrap; user-select: none; }
.shown, .stated { margin: 1.1rem auto; text-align: center; padding: 0.15rem 0.1rem; }
.shown { width: max-content; max-width: min(94vw, 66rem); margin-left: 50%; transform: translateX(-50%); overflow-x: auto; overflow-y: hidden; }
.wide table { font-size: 0.84em; }
.stated { text-wrap: balance; overflow-x: auto; overflow-y: hidden; }
pre.shown { text-align: left; font-size: 0.8rem; }
.said { border: 0; margin: 0.8rem 0 0.8rem 1.25rem; font-size: 0.78rem; white-space: pre-wrap; overflow-wrap: anywhere; }
.shown:has(> section) { width: auto; max-width: none; margin-left: 0; transform: none; text-align: left; }
.shown section summary { text-wrap: pretty; }
.said.stderr { color: var(--soft); font-style: italic; }
.failure { margin: 1rem 0; border-left: 3px double var(--wrong); padding-left: 1.1rem; }
.failure pre { font-size: 0.78rem; white-space: pre-wrap; }
.failure::before { content: "this cell failed"; display: block; color: var(--wrong); font-style: italic; }
figure { margin: 1.4rem auto; text-align: center; break-inside: avoid; }
figure svg, figure img { max-width: 100%; height: auto; }
.unread { border-bottom: 1px dotted var(--wrong); }
table { border-collapse: collapse; margin: 1.1rem auto; font-size: 0.9em; border-block: 1px solid var(--ink); font-variant-numeric: lining-nums tabular-nums; }
th, td { padding: 0.28rem 0.85rem; text-align: left; vertical-align: baseline; }
thead th { border-bottom: 1px solid var(--line); font-weight: 500; font-style: italic; }
tbody th { font-weight: 400; }
caption { caption-side: bottom; color: var(--soft); font-size: 0.9em; padding-top: 0.5rem; text-wrap: balance; }
footer { margin-top: 4rem; padding-top: 0.8rem; border-top: 1px solid var(--line); color: var(--soft); font-size: 0.85rem; }
footer p { margin: 0; hyphens: none; }
.joined { white-space: nowrap; }
math { font-family: ${MATHEMATICS}; }
@supports (not (-moz-appearance: none)) { math { font-feature-settings: normal; } }
math.tml-display { margin-block: 0.2rem; }
section.prose math.tml-display { overflow-x: auto; overflow-y: hidden; padding-block: 0.3rem; }
`;

const PRINT = `
@page { size: A4; margin: 24mm 26mm 26mm; }
@media print {
  :root { color-scheme: light; ${LIGHT} --paper: #fff; --ink: #000; }
  body { max-width: none; padding: 0; font-size: 10.5pt; line-height: 1.4; }
  h1 { font-size: 18pt; } h2 { font-size: 13pt; } h3 { font-size: 11pt; }
  .code pre, pre.shown, .said, .failure pre { font-size: 7.8pt; }
  .said, .failure pre { white-space: pre-wrap; overflow-wrap: anywhere; }
  .shown, .stated, pre, section.prose math.tml-display { overflow: visible; }
  .shown { width: fit-content; max-width: 100%; margin-left: auto; transform: none; }
  .shown table { font-size: 8.5pt; }
  .wide table { font-size: 6.9pt; }
  .wide :is(td, th) { padding-right: 1em !important; }
  .code, figure, table, .shown, .stated, .failure { break-inside: avoid; }
  .shown:has(> section), :is(.shown, table):has(tr:nth-child(13)) { break-inside: auto; }
  .shown section li, tr { break-inside: avoid; }
  .shown section > p, .shown summary { break-after: avoid; }
  .code { break-after: avoid; }
  details::details-content { content-visibility: visible; }
  summary { list-style: none; }
  section.step { margin: 1rem 0 1.1rem; }
  figure { margin: 0.6rem auto; max-width: 84%; }
  a { color: inherit; text-decoration: none; }
  footer { break-inside: avoid; break-before: avoid; margin-top: 1.6rem; }
}
`;

/** The style sheet of a page, complete: what MathML needs, then our own. */
export function pageStyle(): string {
  return `${mathematicsStyle()}\n${SCREEN}${PRINT}`;
}

const require = createRequire(import.meta.url);

/**
 * The rules that the MathML writer relies on, and its small font (9 kB) for primes and script letters, in the page itself:
 * mathematics fonts raise a prime that is raised already, so that the one of ℘′ would float.
 */
function mathematicsStyle(): string {
  const font = readFileSync(require.resolve("temml/dist/Temml.woff2")).toString("base64");
  return readFileSync(require.resolve("temml/dist/Temml-Local.css"), "utf8")
    .replace(/\/\*[\s\S]*?\*\//g, "")
    .replace(/src:[^;}]*/, `src: url("data:font/woff2;base64,${font}") format("woff2")`)
    .replace(/\n\s*\n/g, "\n")
    .trim();
}
