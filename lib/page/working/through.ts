// The way from a cubic or a quartic with a point to its Weierstrass model, as a derivation.

import { evaluate, type Polynomial } from "../../algebra/multivariate.ts";
import { rationals as Q } from "../../algebra/rationals.ts";
import { cubicC4C6, cubicInvariants } from "../../curve/map/invariants.ts";
import { changeModel } from "../../curve/weierstrass.ts";
import { Rational } from "../../number/rational.ts";
import type { ThroughPoint } from "../../surface/cubic.ts";
import type { PlaneCurve, PlanePoint } from "../../surface/variety.ts";
import { Derivation } from "../derivation.ts";
import { minimality } from "./minimal.ts";
import { curveCheck, exactly, jointly } from "./parts.ts";

export function throughWorking({ curve, to, from, steps }: ThroughPoint<PlaneCurve>): Derivation {
  const { point, tangent, third, flex, raw, projected } = steps;
  const change = steps.change!; // over Q there is one
  const C = point.curve as unknown as PlaneCurve;
  let working = new Derivation("From the curve and its point to a Weierstrass model", { name: "through" })
    .under("modelChange")
    .step("the curve and the point that becomes $O$", {
      value: { curve: C, point },
      check: exactly(
        C.model.equations.every((f) => evaluate(Q, f, point.coordinates).sign() === 0),
        "the equation is 0 at the point",
      ),
      route: "exact substitution into the equation",
      label: "point",
    });
  if (projected) {
    working = working.step("the plane cubic to which the quadrics are projected from the point", {
      value: projected,
      check: exactly(invariantOf(projected)?.equals(curve.j) ?? false, "its invariants give the j of the model found"),
      route: "by the invariants of the cubic",
      label: "projected",
    });
  }
  if (tangent && third) working = tangentSteps(working, C, point, { tangent, third, flex: flex === true });
  return working
    .step("the model that lines through this point give", {
      value: raw,
      ...curveCheck(raw),
      source: "Cassels, Lectures on Elliptic Curves, chapter 8",
      label: "raw",
    })
    .step("the change to the reduced global minimal model, $x = u^2x' + r$, $y = u^3y' + su^2x' + t$", {
      value: change,
      check: exactly(
        changeModel(Q, raw.a, change).every((c, k) => c.equals(curve.a[k]!)),
        "the new coefficients are those of the minimal model",
      ),
      route: "the formulas for the coefficients of the new model",
      label: "change",
    })
    .step("the reduced global minimal model", {
      value: curve,
      check: jointly(exactly(curve.j.equals(raw.j), "the same j"), minimality(curve)),
      route: "the $j$ of both models, and that no prime can leave once more",
      label: "minimal",
    })
    .step("the map to it", {
      value: to,
      check: to.verify(),
      route: "the formula put into the equation, and composed with the map back both ways",
      label: "to",
    })
    .step("the map back", {
      value: from,
      check: jointly(
        exactly(
          (from(to((third ?? point) as never)) as PlanePoint).equals(third ?? point),
          "a point goes there and back",
        ),
        from.verify(),
      ),
      route: "the formula put into the equation, and a point carried there and back",
      label: "from",
    })
    .step("the pull-backs of the differentials", {
      value: { to: to.factor, from: from.factor },
      check: exactly(
        (to.factor as Rational).times(from.factor as Rational).equals(1),
        "the constants of the two maps multiply to 1",
      ),
      route: "each read from its own formula",
      label: "differential",
    });
}

interface Tangent {
  readonly tangent: NonNullable<ThroughPoint<PlaneCurve>["steps"]["tangent"]>;
  readonly third: PlanePoint;
  readonly flex: boolean;
}

function tangentSteps(working: Derivation, C: PlaneCurve, point: PlanePoint, { tangent, third, flex }: Tangent) {
  const stepped = working.step("the tangent there, where this form vanishes", {
    value: tangent,
    check: exactly(touches(C, point, third, flex), "the equation along the line vanishes at least doubly at the point"),
    route: "values of the equation at points of the line, not its partial derivatives",
    label: "tangent",
  });
  const on = exactly(residual(C, third.coordinates).sign() === 0, "the equation is 0 there");
  return flex
    ? stepped.step("the point is a flex: the tangent meets the curve only there", {
        check: exactly(touches(C, point, third, true), "the equation along the line is a multiple of the cube"),
        route: "values at points of the line",
        label: "flex",
      })
    : stepped.step("the tangent meets the curve again in", {
        value: third,
        check: on,
        route: "exact substitution into the equation",
        label: "third",
      });
}

/** j of a ternary cubic by Aronhold's invariants. */
function invariantOf(form: Polynomial<Rational>): Rational | undefined {
  const invariants = cubicInvariants(Q, form);
  if (!invariants) return undefined;
  const [c4, c6] = cubicC4C6(Q, invariants);
  return c4
    .pow(3)
    .times(1728)
    .div(c4.pow(3).minus(c6.pow(2)));
}

function residual(C: PlaneCurve, coordinates: readonly Rational[]): Rational {
  return evaluate(Q, C.model.equations[0]!, coordinates);
}

/**
 * F(P + tR) for the second point R of the tangent is c1 t + c2 t², so c1 = (F(P + R) − F(P − R))/2 = 0. For a flex the tangent has
 * no second point, and another point of it stands in: there is then only t³.
 */
function touches(C: PlaneCurve, P: PlanePoint, third: PlanePoint, flex: boolean): boolean {
  const R = flex ? otherPoint(C, P) : third.coordinates;
  if (!R) return true;
  const at = (t: number) =>
    residual(
      C,
      P.coordinates.map((c, k) => c.plus(R[k]!.times(t))),
    );
  const [f1, f2, f3] = [at(1), at(2), at(-1)];
  if (!flex) return f1.minus(f3).sign() === 0;
  return f2.equals(f1.times(8)) && f3.equals(f1.neg());
}

/** A point of the tangent other than P: the line is where the gradient's form vanishes. */
function otherPoint(C: PlaneCurve, P: PlanePoint): readonly Rational[] | undefined {
  const line = gradient(C, P);
  const [a, b, c] = line as [Rational, Rational, Rational];
  const candidates = [
    [b, a.neg(), Rational.zero],
    [c, Rational.zero, a.neg()],
    [Rational.zero, c, b.neg()],
  ];
  return candidates.find((R) => R.some((x) => x.sign() !== 0) && !proportional(R, P.coordinates));
}

function proportional(R: readonly Rational[], P: readonly Rational[]): boolean {
  return R.every((x, k) => R.every((y, l) => x.times(P[l]!).equals(y.times(P[k]!))));
}

/** The partial derivatives of a cubic form by differences, exact for degree 3: F(P + he) at h = ±1, ±2. */
function gradient(C: PlaneCurve, P: PlanePoint): Rational[] {
  return P.coordinates.map((_, k) => {
    const at = (h: number) =>
      residual(
        C,
        P.coordinates.map((c, l) => (k === l ? c.plus(h) : c)),
      );
    return at(1)
      .minus(at(-1))
      .times(8)
      .minus(at(2).minus(at(-2)))
      .div(12);
  });
}
