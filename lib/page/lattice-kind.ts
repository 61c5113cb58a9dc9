import type { Rational } from "../number/rational.ts";
import type { EllipticFunction } from "../surface/elliptic-function.ts";
import type { SigmaForm, ZetaForm } from "../surface/function-forms.ts";
import type { Lattice } from "../surface/lattice.ts";
import type { QuasiPeriodicFunction } from "../surface/quasi-periodic-function.ts";
import type { TorusPoint } from "../surface/torus-point.ts";
import type { Kind, Show } from "./kind.ts";
import { numberConventions } from "./number-conventions.ts";
import { complexKind } from "./number-kind.ts";
import { array, small, texWords } from "./tex.ts";

export const latticeKind: Kind<Lattice> = {
  text: (L) => {
    const notice = L.notice ? [L.notice] : [];
    return ["lattice", ...L.periods.map((w) => `  ${w}`), ...notice].join("\n");
  },
  tex: (L, show) => {
    const rows = L.periods.map((w, k) => [`\\omega_${k + 1}`, "=", valueTex(w, show)]);
    const periods = array("rcl", rows);
    return L.notice ? array("l", [[periods], [small(texWords(L.notice))]]) : periods;
  },
  short: (L, part) => ({
    text: L.periods.map((w) => `Z·(${part.text(w)})`).join(" + "),
    tex: L.periods.map((w) => `\\mathbb{Z}\\,(${part.tex(w)})`).join(" + "),
  }),
  conventions: (L) => L.conventions,
  data: (L, show) => ({ kind: "lattice", periods: L.periods.map((w) => show.data(w)) }),
};

/** A point of the torus: its exact coordinates, and the number. */
export const torusPointKind: Kind<TorusPoint> = {
  text: (z) => String(z),
  tex: (z, show) => {
    const name = coordinatesTex(z.coordinates);
    const rest = z.remainder
      ? name === "0"
        ? show.tex(z.remainder)
        : `${name} + ${show.tex(z.remainder)}`.replace("+ -", "- ")
      : name;
    if (rest === "0") return "0";
    const value = valueTex(z, show);
    return isLong(rest, value) ? array("l", [[rest], [`{} = ${value}`]]) : `${rest} = ${value}`;
  },
  cell: (z, show) => complexKind.cell!(z, show),
  conventions: (z) => numberConventions(z),
  data: (z, show) => ({
    kind: "point of a torus",
    coordinates: z.coordinates.map(String),
    value: complexKind.data(z, show),
  }),
};

/** Digits of a name and a value that do not fit on one line of a page. */
const MOST_DIGITS = 70;

function isLong(...parts: readonly string[]): boolean {
  return parts.join("").replace(/\D/g, "").length > MOST_DIGITS;
}

function valueTex(z: TorusPoint, show: Show): string {
  return complexKind.tex!(z, show);
}

/** r ω1 + s ω2 over one denominator. */
function coordinatesTex([r, s]: readonly [Rational, Rational]): string {
  const den = (r.den * s.den) / gcd(r.den, s.den);
  const [m, n] = [(r.num * den) / r.den, (s.num * den) / s.den];
  const terms = [term(m, "\\omega_1"), term(n, "\\omega_2")].filter((text) => text !== "");
  const sum = terms.join(" + ").replace("+ -", "- ");
  if (sum === "") return "0";
  return den === 1n ? sum : `\\frac{${sum}}{${den}}`;
}

function term(k: bigint, name: string): string {
  if (k === 0n) return "";
  return k === 1n ? name : k === -1n ? `-${name}` : `${k}${name}`;
}

function gcd(a: bigint, b: bigint): bigint {
  return b === 0n ? a : gcd(b, a % b);
}

/** A function of a lattice, by its formula in ℘ and ℘′; it is called with a number. */
export const functionKind: Kind<EllipticFunction | QuasiPeriodicFunction> = {
  text: (f) => `${f}, a function of z`,
  tex: (f) => `z \\mapsto ${formulaTex(String(f))}`,
  short: (f) => ({ text: String(f), tex: formulaTex(String(f)) }),
  conventions: (f) => f.conventions,
  data: (f) => ({ kind: "function", formula: String(f) }),
};

/** A function as a quotient of σ or a sum of ζ, whose arguments stand in the formula. */
export const formKind: Kind<SigmaForm | ZetaForm> = {
  text: (f) => `${f}, a function of z`,
  tex: (f) => `z \\mapsto ${spelledTex(String(f))}`,
  short: (f) => ({ text: String(f), tex: spelledTex(String(f)) }),
  conventions: (f) => f.conventions,
  data: (f) => ({ kind: "function", formula: String(f) }),
};

function spelledTex(text: string): string {
  return text
    .replace(new RegExp(`[${DIGITS}]+`, "g"), (raised) => `^{${[...raised].map((d) => DIGITS.indexOf(d)).join("")}}`)
    .replace(/ω(\d+)/g, "\\omega_{$1}")
    .replace(/\^\((\d+)\)/g, "^{($1)}")
    .replaceAll("℘", "\\wp")
    .replaceAll("′", "'")
    .replaceAll("ζ", "\\zeta")
    .replaceAll("σ", "\\sigma")
    .replaceAll("...", "\\ldots ")
    .replaceAll("·", "\\,")
    .replaceAll("−", "-");
}

const DIGITS = "⁰¹²³⁴⁵⁶⁷⁸⁹";

/** The text of a formula as TeX: symbols by their macros, raised digits as exponents, names like g2 with an index. */
function formulaTex(text: string): string {
  return text
    .replace(new RegExp(`[${DIGITS}]+`, "g"), (raised) => `^{${[...raised].map((d) => DIGITS.indexOf(d)).join("")}}`)
    .replace(/\b([gec])(\d+)\b/g, "$1_{$2}")
    .replaceAll("℘′", "\\wp'(z)")
    .replaceAll("℘", "\\wp(z)")
    .replaceAll("ζ", "\\zeta(z)")
    .replaceAll("σ", "\\sigma(z)")
    .replaceAll("ω", "\\omega")
    .replaceAll("·", "\\,")
    .replaceAll("−", "-");
}
