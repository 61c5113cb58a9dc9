// Stored values back from their JSON form; the form itself is made in data.ts.
import { DomainError } from "../proof/errors.ts";
import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import type { ValueData } from "./data.ts";
import * as disc from "./disc.ts";
import { bitLength } from "./fixed/bits.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";
import { Complex, Real } from "./values.ts";

export { type ValueData, valueData } from "./data.ts";

/** The value of a JSON form; an inexact one comes back without origin, as sharp as it was stored. Throws DomainError for another form. */
export function fromValueData(data: ValueData): Rational | Quadratic | Real | Complex {
  switch (data.kind) {
    case "rational":
      return Rational.parse(data.value);
    case "quadratic":
      return Quadratic.of(Rational.parse(data.a), Rational.parse(data.b), BigInt(data.d));
    case "real":
      return new Real(stored(data.middle, data.radius), { standing: data.standing });
    case "complex":
      return new Complex(storedDisc(data), { standing: data.standing });
    default:
      throw new DomainError({
        subject: "value",
        given: `data of kind ${JSON.stringify((data as { kind: unknown }).kind)}`,
        expected: "a stored number",
      });
  }
}

function storedDisc({ re, im, radius, axis }: Extract<ValueData, { kind: "complex" }>): disc.Disc {
  if (axis === "real") return disc.fromBall(stored(re, radius));
  if (axis === "imaginary") return disc.imaginary(stored(im, radius));
  const blot = stored("0", radius);
  return disc.widenBy(disc.fromBalls(stored(re, "0", blot), stored(im, "0", blot)), blot, 1 << 24, false);
}

function stored(middle: string, radius: string, scale?: Ball): Ball {
  if (vast(middle) || vast(radius)) return storedVast(middle, radius);
  const m = Rational.parse(middle);
  const r = Rational.parse(radius);
  const least =
    scale && scale.rad > 0
      ? ball.magnitude(scale)
      : r.num === 0n
        ? undefined
        : ball.magnitude(ball.fromRational(r, 30));
  const size = m.num === 0n ? 0 : ball.magnitude(ball.fromRational(m, 30));
  const prec = least === undefined ? bitLength(m.num) + bitLength(m.den) + 64 : Math.max(40, size - least + 40);
  const centre = ball.fromRational(m, prec);
  return r.num === 0n ? centre : ball.widenBy(centre, ball.fromRational(r, 40), prec);
}

/** Whether a decimal is too large or too small for an exact rational. */
function vast(text: string): boolean {
  return Math.abs(Number(text.split("e")[1] ?? 0)) > 100_000;
}

function storedVast(middle: string, radius: string): Ball {
  const power = (text: string): Ball => {
    const [digits, e] = text.split("e");
    const n = BigInt(digits!);
    const prec = bitLength(n) + 64;
    return ball.mul(ball.fromInt(n), ball.pow(ball.fromInt(10), Number(e ?? 0), prec), prec);
  };
  return ball.widenBy(power(middle), power(radius), bitLength(BigInt(middle.split("e")[0]!)) + 64);
}
