// The one table of how each class of values is shown. A class must stand above the classes it extends.

import { Residue } from "../algebra/primefield.ts";
import { Figure } from "../figure/figure.ts";
import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import { Complex, Real } from "../number/values.ts";
import { isRecognition } from "../surface/claim-answer.ts";
import { Claim } from "../surface/claim-value.ts";
import { ClassPolynomial } from "../surface/class-polynomial.ts";
import { ComplexMultiplication } from "../surface/complex-multiplication.ts";
import { Curve } from "../surface/curve.ts";
import { DegenerateLattice } from "../surface/degenerate.ts";
import { EllipticFunction } from "../surface/elliptic-function.ts";
import { EndomorphismRing } from "../surface/endomorphisms.ts";
import { Factorisation } from "../surface/factorisation.ts";
import { SigmaForm, ZetaForm } from "../surface/function-forms.ts";
import { Homothety } from "../surface/homothety.ts";
import { Jacobi } from "../surface/jacobi.ts";
import { Lattice } from "../surface/lattice.ts";
import { LaurentExpansion } from "../surface/laurent-expansion.ts";
import { Morphism } from "../surface/morphism.ts";
import { Moved } from "../surface/moved.ts";
import { Point } from "../surface/point.ts";
import { QSeries } from "../surface/q-series.ts";
import { QuasiPeriodicFunction } from "../surface/quasi-periodic-function.ts";
import { AlgebraicRelation } from "../surface/relation.ts";
import { PointRelations } from "../surface/relations.ts";
import { SecondRoute } from "../surface/second-route.ts";
import { TorsionSubgroup } from "../surface/torsion.ts";
import { TorusPoint } from "../surface/torus-point.ts";
import { PlaneCurve, PlanePoint } from "../surface/variety.ts";
import { claimKind } from "./claim-kind.ts";
import { curveKind, endomorphismKind, pointKind, relationsKind } from "./curve-kind.ts";
import { Derivation } from "./derivation.ts";
import { derivationKind } from "./derivation-kind.ts";
import { quadraticKind, rationalKind, residueKind } from "./exact-kind.ts";
import { homothetyKind, laurentKind, multiplicationKind, relationKind, secondRouteKind } from "./expansion-kind.ts";
import { factorisationKind } from "./factorisation-kind.ts";
import { figureKind } from "./figure-kind.ts";
import { entry, type KindEntry, shape } from "./kind.ts";
import { formKind, functionKind, latticeKind, torusPointKind } from "./lattice-kind.ts";
import { classPolynomialKind, jacobiKind, movedKind, qSeriesKind } from "./modular-kind.ts";
import { morphismKind } from "./morphism-kind.ts";
import { complexKind, realKind } from "./number-kind.ts";
import { isPolynomial, planeCurveKind, planePointKind, polynomialKind } from "./plane-kind.ts";
import { degenerateKind, isReducedBasis, recognitionKind, reducedBasisKind, throughKind } from "./record-kind.ts";
import { isStanding, standingKind } from "./standing.ts";
import { Table } from "./table.ts";
import { tableKind } from "./table-kind.ts";
import { isThroughPoint } from "./through-shape.ts";
import { torsionKind } from "./torsion-kind.ts";

export const KINDS: readonly KindEntry[] = [
  entry(TorusPoint, torusPointKind),
  entry(Real, realKind),
  entry(Complex, complexKind),
  entry(Rational, rationalKind),
  entry(Quadratic, quadraticKind),
  entry(Residue, residueKind),
  entry(Factorisation, factorisationKind),
  entry(Lattice, latticeKind),
  entry(EllipticFunction, functionKind),
  entry(QuasiPeriodicFunction, functionKind),
  entry(SigmaForm, formKind),
  entry(ZetaForm, formKind),
  entry(Point, pointKind),
  entry(Curve, curveKind),
  entry(EndomorphismRing, endomorphismKind),
  entry(PointRelations, relationsKind),
  entry(TorsionSubgroup, torsionKind),
  entry(PlaneCurve, planeCurveKind),
  entry(PlanePoint, planePointKind),
  entry(Morphism, morphismKind),
  shape(isPolynomial, polynomialKind),
  shape(isStanding, standingKind),
  shape(isReducedBasis, reducedBasisKind),
  shape(isThroughPoint, throughKind),
  shape(isRecognition, recognitionKind),
  entry(DegenerateLattice, degenerateKind),
  entry(LaurentExpansion, laurentKind),
  entry(Homothety, homothetyKind),
  entry(ComplexMultiplication, multiplicationKind),
  entry(SecondRoute, secondRouteKind),
  entry(AlgebraicRelation, relationKind),
  entry(Jacobi, jacobiKind),
  entry(ClassPolynomial, classPolynomialKind),
  entry(QSeries, qSeriesKind),
  entry(Moved, movedKind),
  entry(Claim, claimKind),
  entry(Derivation, derivationKind),
  entry(Table, tableKind),
  entry(Figure, figureKind),
];
