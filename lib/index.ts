// The names that a cell sees. Each comes from the file that says what it does. (A heading that stands alone keeps the
// sorting of names within its group.)

// Numbers

export { provedDigits } from "./number/context.ts";
export { complex, enclose, exact, rational, real } from "./number/convert.ts";
export {
  abs,
  acos,
  acosh,
  agm,
  arg,
  asin,
  asinh,
  atan,
  atan2,
  atanh,
  atDigits,
  conj,
  cos,
  cosh,
  exp,
  gamma,
  ln,
  nthRoot,
  pow,
  sin,
  sinh,
  sqrt,
  tan,
  tanh,
} from "./number/functions.ts";
export { toComplexjs, toDecimal, toFraction } from "./number/interchange.ts";
export { Quadratic, quadratic } from "./number/quadratic.ts";
export { Rational } from "./number/rational.ts";
export { type Recognition, recognise } from "./number/recognise.ts";
export { eulerGamma, i, π } from "./number/symbols.ts";
export { Complex, type ComplexNumeric, type Numeric, Real } from "./number/values.ts";
export { zero } from "./number/zero.ts";

// Lattices and curves

export { Residue } from "./algebra/primefield.ts";
export { ComplexMultiplication } from "./surface/complex-multiplication.ts";
export { type Line, PlaneCubic, type ThroughPoint } from "./surface/cubic.ts";
export { Curve } from "./surface/curve.ts";
export { DegenerateLattice, degenerate } from "./surface/degenerate.ts";
export {
  DivisorFunction,
  type EllipticData,
  type PrincipalPart,
  PrincipalPartsFunction,
  type Weighted,
} from "./surface/elliptic.ts";
export { EllipticFunction, type FunctionPoint } from "./surface/elliptic-function.ts";
export { EndomorphismRing } from "./surface/endomorphisms.ts";
export { Factorisation, factor } from "./surface/factorisation.ts";
export { SigmaForm, ZetaForm, type ZetaPart } from "./surface/function-forms.ts";
export { Homothety, homothety } from "./surface/homothety.ts";
export {
  type IntegerMatrix,
  Lattice,
  type LatticeInput,
  type Location,
  type ReducedBasis,
} from "./surface/lattice.ts";
export { LaurentExpansion } from "./surface/laurent-expansion.ts";
export { cubic } from "./surface/make-cubic.ts";
export { curve } from "./surface/make-curve.ts";
export { lattice } from "./surface/make-lattice.ts";
export { biquadratic, quadrics } from "./surface/make-quadrics.ts";
export { quartic } from "./surface/make-quartic.ts";
export { Morphism } from "./surface/morphism.ts";
export { Point } from "./surface/point.ts";
export { Biquadratic, QuadricPair } from "./surface/quadrics.ts";
export { Quartic } from "./surface/quartic.ts";
export { QuasiPeriodicFunction } from "./surface/quasi-periodic-function.ts";
export { AlgebraicRelation } from "./surface/relation.ts";
export { PointRelations } from "./surface/relations.ts";
export { routesOf, SecondRoute, secondRoute } from "./surface/second-route.ts";
export { TorsionSubgroup } from "./surface/torsion.ts";
export { TorusPoint } from "./surface/torus-point.ts";
export type { LogarithmChoice } from "./surface/uniformise.ts";
export { PlanePoint } from "./surface/variety.ts";

// Integrals, Jacobi's functions, theta and modular functions

export { carlson } from "./surface/carlson.ts";
export { ClassPolynomial } from "./surface/class-polynomial.ts";
export { Jacobi, jacobi } from "./surface/jacobi.ts";
export { type CharacteristicInput, legendre } from "./surface/legendre.ts";
export { type MatrixInput, modular } from "./surface/modular.ts";
export type { ModulusInput } from "./surface/modulus.ts";
export { Moved } from "./surface/moved.ts";
export { QSeries } from "./surface/q-series.ts";
export { type ThetaInput, theta, thetaLogarithmic } from "./surface/theta.ts";

// Claims

export { claims } from "./page/claims.ts";
export { claim, conjunction } from "./surface/claim.ts";
export { Claim, type Relation } from "./surface/claim-value.ts";

// Figures and pages

export { Figure } from "./figure/figure.ts";
export * as figure from "./figure/figures.ts";
// The notebook itself
export { ask } from "./page/ask.ts";
export { Derivation, derivation } from "./page/derivation.ts";
export { notebook } from "./page/notebook.ts";
export { progress } from "./page/progress.ts";
export { sources } from "./page/sources.ts";
export { type Row, Table, type TableOptions, type TableValue, table } from "./page/table.ts";
export { tex, typeset } from "./page/typeset.ts";
export { working } from "./page/working.ts";
