// Which conventions a number rests on: read off the record of how it was built.

import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { isDisc, isNode } from "../number/origin.ts";
import { type ConventionKey, conventionOrder } from "../proof/conventions.ts";

/** Rows that the result of an operation needs beside it, by the name of the operation. */
const ROWS: Readonly<Record<string, readonly ConventionKey[]>> = {
  point: ["periods"],
  "period ratio": ["periods"],
  "reduced period ratio": ["fundamentalDomain"],
  invariant: ["cubic"],
  root: ["roots"],
  "quasi-period": ["quasiPeriods"],
  discriminant: ["discriminant"],
  j: ["j"],
  wp: ["cubic"],
  "wp.prime": ["cubic"],
  zeta: ["quasiPeriods"],
  "elliptic logarithm": ["cubic"],
  "elliptic logarithm on its component": ["differential", "components"],
  ...rows(["modulus"], "complete K, complete E, complete D, complete B, complete Π"),
  ...rows(["modulus"], "incomplete F, incomplete E, incomplete D, incomplete B, incomplete Π"),
  ...rows(["modulus"], "sn, cn, dn, ns, nc, nd, sc, sd, cs, cd, ds, dc, am, Jacobi epsilon, Jacobi zeta"),
  ...rows(["modulus"], "arcsn, arccn, arcdn, arcns, arcnc, arcnd, arcsc, arcsd, arccs, arccd, arcds, arcdc"),
  ...rows(["theta"], "theta, theta logarithmic"),
  ...rows(["eisenstein"], "Eisenstein E, Eisenstein G, Eisenstein G2"),
  "modular lambda": ["roots"],
};

/** The same rows for each of the names. */
function rows(keys: readonly ConventionKey[], names: string): Record<string, readonly ConventionKey[]> {
  return Object.fromEntries(names.split(", ").map((name) => [name, keys]));
}

/** Operations whose result depends on the basis that was chosen where none was given. */
const BASIS_DEPENDENT = new Set(["point", "period ratio", "quasi-period"]);

/** Functions with a cut, which matters for complex arguments only. */
const CUT = new Set(["arg", "ln", "sqrt"]);

/** A record longer than this is not read to its end. */
const MOST_STEPS = 2000;

export function numberConventions(x: unknown): readonly ConventionKey[] {
  const found = new Set<ConventionKey>();
  const seen = new Set<unknown>();
  const open: unknown[] = [x];
  while (open.length > 0 && seen.size < MOST_STEPS) {
    const node = open.pop();
    if (!isNode(node) || seen.has(node) || !node.origin) continue;
    seen.add(node);
    const { operation, operands } = node.origin;
    for (const key of ROWS[operation.name] ?? []) found.add(key);
    if (BASIS_DEPENDENT.has(operation.name)) found.add(basisRow(operands[0]) ?? "periods");
    if (CUT.has(operation.name) && isOffAxis(operands[0])) found.add("branch");
    open.push(...operands);
  }
  return conventionOrder(found);
}

function isOffAxis(operand: unknown): boolean {
  return isNode(operand) && isDisc(operand.enclosure) && operand.enclosure.axis !== "real";
}

/** The row on the chosen basis, for a lattice that was not given by its periods. */
function basisRow(operand: unknown): ConventionKey | undefined {
  const lattice = operand as Partial<PeriodLattice> | undefined;
  if (lattice?.given?.kind !== "invariants") return undefined;
  return lattice.components ? "realBasis" : "signOfPeriods";
}
