// The reduced basis of a lattice as steps: moves of τ into the fundamental domain, their matrix, the new τ.

import { Complex } from "../../number/values.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import type { Lattice } from "../../surface/lattice.ts";
import { modular } from "../../surface/modular.ts";
import { Derivation } from "../derivation.ts";
import { type Table, table } from "../table.ts";
import { exactly, jointly, legendreCheck, plainNumber } from "./parts.ts";

const SOURCE = "Serre, A Course in Arithmetic, VII.1.2, theorem 1";

export function reducedWorking(L: Lattice): Derivation {
  const [w1, w2] = L.periods;
  const start = new Derivation("Reduced basis of a lattice", { name: "reduced" })
    .under("periods", "fundamentalDomain")
    .step("the basis", {
      value: { ω1: plainNumber(w1), ω2: plainNumber(w2), τ: L.tau },
      ...legendreCheck(L),
      label: "basis",
    });
  return reductionSteps(start, L);
}

export function reductionSteps(working: Derivation, L: Lattice): Derivation {
  const { matrix, tau, periods, boundary } = L.reduced;
  const [[a, b], [c, d]] = matrix;
  const [w1, w2] = L.periods.map(plainNumber) as [Complex, Complex];
  const moves = moveTable(matrix, L.tau);
  const moved = moves
    ? working.step("moves of $\\tau$ into the fundamental domain: $T^n: \\tau + n$, $S: -1/\\tau$", {
        value: moves.table,
        source: SOURCE,
        check: standingOf(moves.last, "=", byMatrix(matrix, L.tau)),
        route: "the last $\\tau$ against $(a\\tau + b)/(c\\tau + d)$ in one step",
        label: "moves",
      })
    : working;
  return moved
    .step("the matrix of all moves, $\\tau' = (a\\tau + b)/(c\\tau + d)$", {
      value: matrix,
      check: jointly(
        exactly(a * d - b * c === 1n, "its determinant is 1"),
        standingOf(combination(d, w1, c, w2), "=", plainNumber(periods[0])),
        standingOf(combination(b, w1, a, w2), "=", plainNumber(periods[1])),
      ),
      route:
        "determinant 1, and $\\omega_1' = d\\omega_1 + c\\omega_2$, $\\omega_2' = b\\omega_1 + a\\omega_2$ in numbers",
      label: "matrix",
    })
    .step(`the reduced basis; $\\tau'$ is ${WHERE[boundary]}`, {
      value: { "ω1′": periods[0], "ω2′": periods[1], "τ′": tau },
      check: standingOf(modular.j(tau), "=", L.j),
      route: "$j(\\tau')$ by its q-series against $1728 g_2^3/\\Delta$ of the lattice",
      label: "reduced",
    });
}

const WHERE = {
  inside: "inside the fundamental domain",
  on: "on the boundary of the fundamental domain, by an exact argument",
  undecided: "so near to the boundary of the fundamental domain that the enclosures allow both sides",
};

/** The word in S and T of a matrix, by the Euclidean algorithm on its lower row; undefined for the identity. */
function moveTable(matrix: Matrix, tau: Complex): { readonly table: Table; readonly last: Complex } | undefined {
  let [[a, b], [c, d]] = matrix as readonly [readonly [bigint, bigint], readonly [bigint, bigint]];
  const moves: (bigint | "S")[] = [];
  while (c !== 0n) {
    // M = T^n S M′ with a smaller lower left entry.
    const n = nearest(a, c);
    [a, b] = [a - n * c, b - n * d];
    if (n !== 0n) moves.unshift(n);
    [a, b, c, d] = [c, d, -a, -b];
    moves.unshift("S");
  }
  if (b !== 0n) moves.unshift(b * d);
  if (moves.length === 0) return undefined;
  let place = tau;
  const rows = moves.map((move) => {
    place = move === "S" ? Complex.from(-1).div(place) : place.plus(move);
    return [move === "S" ? "$S$" : `$T^{${move}}$`, place];
  });
  return { table: table(rows, { columns: ["move", "$\\tau$ after it"] }), last: place };
}

type Matrix = Lattice["reduced"]["matrix"];

function byMatrix([[a, b], [c, d]]: Matrix, tau: Complex): Complex {
  return tau.times(a).plus(b).div(tau.times(c).plus(d));
}

function combination(m: bigint, w1: Complex, n: bigint, w2: Complex): Complex {
  return w1.times(m).plus(w2.times(n));
}

function nearest(a: bigint, c: bigint): bigint {
  const size = c < 0n ? -c : c;
  const twice = 2n * (c < 0n ? -a : a) + size;
  const quotient = twice / (2n * size);
  return twice % (2n * size) < 0n ? quotient - 1n : quotient;
}
