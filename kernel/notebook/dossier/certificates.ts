// What can be checked by hand among the stored values: points, maps with their kernels, torsion with its primes, matrices,
// factorisations. Each is taken out with the place where it stands and with what it asserts.
import { isCode, type Notebook } from "../format.ts";
import { VALUE_TYPE } from "../values.ts";

type Fields = Readonly<Record<string, unknown>>;

export interface Certificate {
  /** Place among the code cells that hold code, from 1, and inside the value. */
  readonly cell: number;
  readonly at: string;
  readonly kind: string;
  /** What a reader verifies. */
  readonly assertion: string;
  readonly data: unknown;
}

const ASSERTIONS: Readonly<Record<string, string>> = {
  point: "the coordinates satisfy the equation with these coefficients [a1, a2, a3, a4, a6]",
  "point of a torus": "the value is the combination of the periods with these coordinates",
  map: "substituted into the equation of the target, the formula gives a multiple of the equation of the source",
  torsion: "the generators have these orders, and the orders of the reductions have no larger common divisor",
  factorisation: "the factors are primes and their product is the value",
  homothety: "the factor carries the first lattice onto the second",
  "complex multiplication": "the stated discriminant belongs to an order that acts on the lattice",
  derivation: "each step follows from those before it; the values of the steps are given",
  claim: "the relation holds to the standing that is given",
};

/** Certificates in the order of the notebook. */
export function certificatesOf(notebook: Notebook): Certificate[] {
  const found: Certificate[] = [];
  const cells = notebook.cells.filter(isCode).filter((cell) => cell.source.trim() !== "");
  for (const [index, cell] of cells.entries()) {
    const values = cell.outputs.flatMap((output) => ("data" in output ? [output.data[VALUE_TYPE]] : []));
    for (const [place, value] of values.entries()) collect(value, index + 1, `value ${place + 1}`, found);
  }
  return found;
}

function collect(value: unknown, cell: number, at: string, found: Certificate[]): void {
  if (Array.isArray(value)) {
    for (const [index, part] of value.entries()) collect(part, cell, `${at}[${index}]`, found);
    return;
  }
  if (typeof value !== "object" || value === null) return;
  const fields = value as Fields;
  const kind = typeof fields.kind === "string" ? fields.kind : "";
  const assertion = ASSERTIONS[kind];
  if (assertion !== undefined) found.push({ cell, at, kind, assertion, data: value });
  if (Array.isArray(fields.matrix)) {
    const told = "the new basis is this integer matrix, of determinant 1 or -1, times the old one";
    found.push({ cell, at: `${at}.matrix`, kind: "matrix", assertion: told, data: value });
  }
  // What is inside a map are its two curves; inside the others further certificates may stand.
  if (kind !== "map") for (const [name, part] of Object.entries(fields)) collect(part, cell, `${at}.${name}`, found);
}
