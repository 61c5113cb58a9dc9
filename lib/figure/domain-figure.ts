import type { ComplexNumeric } from "../number/values.ts";
import { Lattice } from "../surface/lattice.ts";
import { drawDomain } from "./domain-picture.ts";
import { complexDouble } from "./doubles.ts";
import { fact } from "./facts.ts";
import type { Figure } from "./figure.ts";
import { type Named, namedEntries } from "./named.ts";

export interface DomainFigureOptions {
  /** Values of τ to be marked, by their names; a lattice stands for its reduced τ. */
  readonly points?: Named<ComplexNumeric | Lattice>;
}

/**
 * The fundamental domain of SL2(Z) in the upper half plane, with marked values of τ. The border that belongs to it is
 * solid, the other dashed.
 *
 * Domain   Im τ > 0.
 * @example figure.fundamentalDomain({ points: { A: L, B: M } })
 */
export function fundamentalDomain(options: DomainFigureOptions = {}): Figure {
  const named = namedEntries(options.points, (_, k) => `τ${k + 1}`);
  const marks = named.map(([label, value]) => {
    const tau = value instanceof Lattice ? value.reduced.tau : value;
    const at = complexDouble("figure.fundamentalDomain", tau);
    if (!(at[1] > 0)) throw new RangeError(`figure.fundamentalDomain: τ = ${String(tau)}; expected Im τ > 0`);
    return { mark: { at, label }, text: fact(tau) };
  });
  const boundary = named.flatMap(([label, value]) =>
    value instanceof Lattice ? [`${label}: ${value.reduced.boundary}`] : [],
  );
  return drawDomain({
    marks: marks.map(({ mark }) => mark),
    remarks: boundary.length > 0 ? [`Place in the domain: ${boundary.join("; ")}.`] : [],
    data: {
      figure: "fundamental domain",
      points: Object.fromEntries(marks.map(({ mark, text }) => [mark.label, text])),
    },
  });
}
