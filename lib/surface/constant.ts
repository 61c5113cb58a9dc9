// Numbers as coefficients of elliptic functions: exactly, by the name of an invariant or root of the lattice, or by a name of their own.

import { pointText } from "../lattice/coordinates-text.ts";
import type { FunctionField } from "../lattice/field/element.ts";
import { CONSTANT, type Expression } from "../lattice/field/operations.ts";
import { addScalars, type Constants, exactOf, exactScalar, namedScalar, type Scalar } from "../lattice/field/scalar.ts";
import { INVARIANT, ROOT, WEIERSTRASS } from "../lattice/operations.ts";
import { type Coordinates, nearestRepresentative } from "../lattice/torus.ts";
import { DIV, MINUS, NEG, PLUS, POWER, TIMES } from "../number/operations.ts";
import { apply, type Complex, type Real } from "../number/values.ts";

const names = new WeakMap<object, string>();
let count = 0;

/** A scalar with the constants that its names stand for. */
export interface NamedScalar {
  readonly scalar: Scalar;
  readonly constants: Constants;
}

/** Sums and products deeper than this stay numbers with a name of their own. */
const DEEPEST = 24;

/** A number as a scalar of the function field: taken apart where it is a polynomial in constants that are known to the lattice. */
export function scalarOf(field: FunctionField, value: Real | Complex, depth = 0): NamedScalar {
  if (value.exact) return { scalar: exactScalar(value.exact), constants: new Map() };
  const known = ofLattice(field, value) ?? (depth < DEEPEST ? fromParts(field, value, depth + 1) : undefined);
  if (known) return known;
  const at = pointValue(field, value);
  if (at) return at;
  let name = names.get(value);
  if (name === undefined) {
    name = `c${++count}`;
    names.set(value, name);
  }
  return { scalar: namedScalar(name), constants: new Map([[name, value]]) };
}

function fromParts(field: FunctionField, { origin }: Real | Complex, depth: number): NamedScalar | undefined {
  if (!origin) return undefined;
  const { ring } = field;
  const { operation, operands } = origin;
  const part = (k: number) => scalarOf(field, operands[k] as Real | Complex, depth);
  const joined = (join: (s: Scalar, t: Scalar) => Scalar): NamedScalar => {
    const [x, y] = [part(0), part(1)];
    return { scalar: join(x.scalar, y.scalar), constants: new Map([...x.constants, ...y.constants]) };
  };
  if (operation === PLUS) return joined(ring.add);
  if (operation === MINUS) return joined(ring.sub);
  if (operation === TIMES) return joined(ring.mul);
  if (operation === NEG) return { ...part(0), scalar: ring.neg(part(0).scalar) };
  if (operation === DIV) {
    const divisor = (operands[1] as Real | Complex).exact;
    return divisor && joined((s, t) => ring.mul(s, ring.inv(t)));
  }
  if (operation !== POWER || !((operands[1] as number) >= 0)) return undefined;
  const base = part(0);
  let scalar = ring.one;
  for (let k = 0; k < (operands[1] as number); k++) scalar = ring.mul(scalar, base.scalar);
  return { scalar, constants: base.constants };
}

/** ℘ and ℘′ at a point with exact coordinates have one name, whatever call they come from; ℘ is even and ℘′ odd. */
function pointValue({ lattice, ring }: FunctionField, value: Real | Complex): NamedScalar | undefined {
  const { origin } = value;
  const prime = origin?.operation === WEIERSTRASS.prime.point;
  if (!origin || !(prime || origin.operation === WEIERSTRASS.wp.point)) return undefined;
  if (origin.operands[0] !== lattice || origin.operands.length !== 3) return undefined;
  const at = nearestRepresentative(origin.operands.slice(1) as unknown as Coordinates);
  const turned = at[0].sign() < 0 || (at[0].sign() === 0 && at[1].sign() < 0);
  const where = turned ? nearestRepresentative([at[0].neg(), at[1].neg()]) : at;
  const name = `${prime ? "℘′" : "℘"}(${pointText(where)})`;
  const operation = prime ? WEIERSTRASS.prime.point : WEIERSTRASS.wp.point;
  const constants: Constants = new Map([[name, apply(operation, [lattice, ...where])]]);
  const scalar = namedScalar(name);
  return { scalar: turned && prime ? ring.neg(scalar) : scalar, constants };
}

/** g2, g3, e1, e2, e3 of the lattice are recognised by the way the number was made. */
function ofLattice(field: FunctionField, value: Real | Complex): NamedScalar | undefined {
  const scalar = latticeScalar(field, value);
  return scalar && { scalar, constants: new Map() };
}

function latticeScalar({ lattice, ring }: FunctionField, value: Real | Complex): Scalar | undefined {
  const { given } = lattice;
  if (given.kind === "invariants" && (value === given.g2 || value === given.g3)) {
    return namedScalar(value === given.g2 ? "g2" : "g3");
  }
  const { origin } = value;
  if (!origin || origin.operands[0] !== lattice) return undefined;
  const index = origin.operands[1];
  if (origin.operation === INVARIANT) return namedScalar(index === 2 ? "g2" : "g3");
  if (origin.operation !== ROOT) return undefined;
  if (index !== 3) return namedScalar(`e${index}`);
  return ring.neg(addScalars(namedScalar("e1"), namedScalar("e2")));
}

/** A scalar of an expression as a number: exact, or with the constants that it names. */
export function constantValue(expression: Expression, s: Scalar): Real | Complex {
  return apply(CONSTANT, [expression, s], exactOf(s));
}
