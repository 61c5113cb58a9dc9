// What the declaration of a function says of the place where an argument, or a part of one, stands.
//
// The type that is expected of the argument of a generic function is what was inferred from the argument itself: `number` for 1/3 in
// curve`... ${1/3}`. The declaration still says that numbers of the library are taken there.
import { type TS, ts } from "./typescript.ts";
import { members } from "./values.ts";

/** A property by its name, or an element of an array. */
type Step = string | typeof ELEMENT;
const ELEMENT = Symbol("element");

/** The types that the declaration of the called function allows at an expression within an argument of its. */
export function declaredTypes(node: TS.Expression, checker: TS.TypeChecker): readonly TS.Type[] {
  const { argument, path } = withinArgument(node);
  const place = placeOf(argument);
  const declaration = place && checker.getResolvedSignature(place.call)?.getDeclaration();
  const parameters = declaration?.parameters.filter((one) => one.name.getText() !== "this");
  const parameter = place && (parameters?.[place.index] ?? parameters?.at(-1));
  if (!parameter) return [];
  const whole = [checker.getTypeAtLocation(parameter)];
  const steps: readonly Step[] = parameter.dotDotDotToken ? [ELEMENT, ...path] : path;
  return steps.reduce<readonly TS.Type[]>((types, step) => parts(types, step, checker), whole);
}

/** The argument around an expression, and the way from it down to the expression. */
function withinArgument(node: TS.Expression): { argument: TS.Node; path: readonly Step[] } {
  const path: Step[] = [];
  let at: TS.Node = node;
  for (;;) {
    const { parent } = at;
    if (ts.isArrayLiteralExpression(parent)) path.unshift(ELEMENT);
    else if (ts.isPropertyAssignment(parent) && parent.initializer === at && !ts.isComputedPropertyName(parent.name)) {
      path.unshift(parent.name.text);
    } else if (ts.isConditionalExpression(parent) && parent.condition === at) break;
    else if (!PASSED.some((passed) => passed(parent))) break;
    at = parent;
  }
  return { argument: at, path };
}

/** What an argument reaches through unchanged. */
const PASSED: readonly ((node: TS.Node) => boolean)[] = [
  ts.isParenthesizedExpression,
  ts.isConditionalExpression,
  ts.isObjectLiteralExpression,
];

function placeOf(argument: TS.Node): { call: TS.CallLikeExpression; index: number } | undefined {
  const { parent } = argument;
  if (ts.isCallExpression(parent) || ts.isNewExpression(parent)) {
    const index = parent.arguments?.indexOf(argument as TS.Expression) ?? -1;
    return index < 0 ? undefined : { call: parent, index };
  }
  if (!ts.isTemplateSpan(parent) || !ts.isTaggedTemplateExpression(parent.parent.parent)) return undefined;
  return { call: parent.parent.parent, index: 1 + parent.parent.templateSpans.indexOf(parent) };
}

function parts(types: readonly TS.Type[], step: Step, checker: TS.TypeChecker): readonly TS.Type[] {
  return alternatives(types, checker).flatMap((type) => {
    if (step === ELEMENT) return checker.getIndexTypeOfType(type, ts.IndexKind.Number) ?? [];
    const property = type.getProperty(step);
    return property ? checker.getTypeOfSymbol(property) : [];
  });
}

/** A type parameter stands for what it extends, a union for its members. */
function alternatives(types: readonly TS.Type[], checker: TS.TypeChecker): readonly TS.Type[] {
  return types.flatMap((type) => members(checker.getBaseConstraintOfType(type) ?? type));
}
