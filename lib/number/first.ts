import * as ball from "./ball.ts";
import { accuracy, type Enclosure, type Exact, evaluate, isNode, mayPass, type Node, refinable } from "./origin.ts";

const FIRST_TRIES = 6;

/**
 * The enclosure of a new value: its operation on the enclosures that the operands have; where these are too wide (a straddled pole or
 * cut) and can be refined, with twice the bits again and again, a few times.
 */
export function firstEvaluation(node: Node, prec: number): Enclosure {
  const { operation, operands } = node.origin!;
  const direct = (operand: unknown): Enclosure => {
    const y = operand as Partial<Node>;
    return y.enclosure ?? evaluate({ ...node, origin: undefined, exact: operand as Exact }, prec);
  };
  try {
    return operation.evaluate(
      operands,
      (x) => (typeof x === "object" && x !== null ? direct(x) : ball.fromInt(x as bigint)),
      prec,
    );
  } catch (error) {
    const sharper = operands.some((x) => isNode(x) && accuracy(x.enclosure) !== Infinity && refinable(x));
    if (!mayPass(error) || !sharper) throw error;
  }
  for (let bits = 2 * prec, k = 0; ; bits *= 2, k++) {
    try {
      return evaluate({ ...node, enclosure: { man: 0n, exp: 0, rad: 1 } }, bits);
    } catch (error) {
      if (!mayPass(error) || k === FIRST_TRIES) throw error;
    }
  }
}
