// The elementary functions as methods of a number: x.cos() is cos(x).
import { type ExactOn, exactCosine, exactExponential, exactSine, exactTangent } from "./angles.ts";
import { ACOS, ACOSH, ASIN, ASINH, ATAN, ATANH, COS, COSH, EXP, LN, SIN, SINH, TAN, TANH } from "./elementary.ts";
import type { Operation } from "./origin.ts";
import { Rational } from "./rational.ts";
import { Value } from "./value.ts";

/** An exact result of a rational argument, where there is one. */
export type ExactAt = (x: Rational) => Rational | undefined;

const at =
  (point: number, value: number): ExactAt =>
  (x) =>
    x.equals(point) ? Rational.of(value) : undefined;
const ZERO_TO_ZERO = at(0, 0);
const ZERO_TO_ONE = at(0, 1);
const ONE_TO_ZERO = at(1, 0);

/** What Real and Complex share; domain, branch and errors are those of the function of the same name. */
export abstract class Elementary<Own> extends Value {
  /** The value of an operation of one number; `multiple` has its exact values at multiples of π. */
  protected abstract mapped(operation: Operation, exact: ExactAt, multiple?: ExactOn): Own;

  /** e^x; exactly 1 for x = 0, and exact at such multiples of iπ as quadratic fields hold. */
  exp(): Own {
    return this.mapped(EXP, ZERO_TO_ONE, exactExponential);
  }

  /** The natural logarithm of a positive number, or the principal one of a complex number; see the function `ln`. */
  ln(): Own {
    return this.mapped(LN, ONE_TO_ZERO);
  }

  /** sin x, x in radians; exact at the multiples of π/6 and π/4. */
  sin(): Own {
    return this.mapped(SIN, ZERO_TO_ZERO, exactSine);
  }

  /** cos x, x in radians; exact at the multiples of π/6 and π/4. */
  cos(): Own {
    return this.mapped(COS, ZERO_TO_ONE, exactCosine);
  }

  /** tan x, x in radians; exact at the multiples of π/12. Throws PoleError where the cosine cannot be told from 0. */
  tan(): Own {
    return this.mapped(TAN, ZERO_TO_ZERO, exactTangent);
  }

  /** asin x in [−π/2, π/2] for a real x of [−1, 1]; see the function `asin`. */
  asin(): Own {
    return this.mapped(ASIN, ZERO_TO_ZERO);
  }

  /** acos x in [0, π] for a real x of [−1, 1]; see the function `acos`. */
  acos(): Own {
    return this.mapped(ACOS, ONE_TO_ZERO);
  }

  /** atan x in (−π/2, π/2) for a real x; see the function `atan`. */
  atan(): Own {
    return this.mapped(ATAN, ZERO_TO_ZERO);
  }

  /** Hyperbolic sine. */
  sinh(): Own {
    return this.mapped(SINH, ZERO_TO_ZERO);
  }

  /** Hyperbolic cosine. */
  cosh(): Own {
    return this.mapped(COSH, ZERO_TO_ONE);
  }

  /** Hyperbolic tangent. Throws PoleError where the enclosure holds a pole. */
  tanh(): Own {
    return this.mapped(TANH, ZERO_TO_ZERO);
  }

  /** Inverse hyperbolic sine; see the function `asinh`. */
  asinh(): Own {
    return this.mapped(ASINH, ZERO_TO_ZERO);
  }

  /** Inverse hyperbolic cosine, >= 0 for a real x >= 1; see the function `acosh`. */
  acosh(): Own {
    return this.mapped(ACOSH, ONE_TO_ZERO);
  }

  /** Inverse hyperbolic tangent, for a real |x| < 1; see the function `atanh`. */
  atanh(): Own {
    return this.mapped(ATANH, ZERO_TO_ZERO);
  }
}
