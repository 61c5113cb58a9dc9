// What the type of an operand says about it: a plain value of the language, a value of the library, or either.
import { type TS, ts } from "./typescript.ts";

const PLAIN =
  ts.TypeFlags.NumberLike |
  ts.TypeFlags.BigIntLike |
  ts.TypeFlags.StringLike |
  ts.TypeFlags.BooleanLike |
  ts.TypeFlags.Null |
  ts.TypeFlags.Undefined |
  ts.TypeFlags.Void |
  ts.TypeFlags.Never;

/** Members of which a value of the library has at least one. */
const MEMBERS = ["plus", "times", "neg", "equals"];

const WORDS: Readonly<Record<string, string>> = {
  Real: "a real number",
  Complex: "a complex number",
  Rational: "a rational number",
  Quadratic: "a quadratic number",
  Point: "a point",
  TorusPoint: "a point of a torus",
  EllipticFunction: "an elliptic function",
  Curve: "a curve",
  PlaneCubic: "a plane cubic",
  Lattice: "a lattice",
  Morphism: "a morphism",
  Polynomial: "a polynomial",
};

/** Reads types of one program. */
export class Values {
  readonly #checker: TS.TypeChecker;
  readonly #libraryFolder: string;

  constructor(checker: TS.TypeChecker, libraryFolder: string) {
    this.#checker = checker;
    this.#libraryFolder = libraryFolder;
  }

  typeOf(node: TS.Node): TS.Type {
    return this.#checker.getTypeAtLocation(node);
  }

  /** Proved to be a number, bigint, string, boolean, null or undefined. */
  isPlain(type: TS.Type): boolean {
    const known = this.#known(type);
    return members(known).every((part) => (part.flags & PLAIN) !== 0);
  }

  /** What a Map or a Set is looked up by; none of any other type. Weak ones are meant to go by the object. */
  keysOf(type: TS.Type): readonly TS.Type[] {
    if (!/^(?:Readonly)?(?:Map|Set)$/.test(type.symbol?.name ?? "")) return [];
    return this.#checker.getTypeArguments(type as TS.TypeReference).slice(0, 1);
  }

  isText(type: TS.Type): boolean {
    return members(this.#known(type)).every((part) => (part.flags & ts.TypeFlags.StringLike) !== 0);
  }

  isAny(type: TS.Type): boolean {
    return (type.flags & (ts.TypeFlags.Any | ts.TypeFlags.Unknown)) !== 0;
  }

  /** Whether some of what the type allows is a value of the library. */
  mayBeLibrary(type: TS.Type): boolean {
    return members(this.#known(type)).some((part) => this.isLibrary(part));
  }

  /** Whether all that the type allows is a value of the library. */
  isAlwaysLibrary(type: TS.Type): boolean {
    const parts = members(this.#known(type));
    return parts.length > 0 && parts.every((part) => this.isLibrary(part));
  }

  isLibrary(type: TS.Type): boolean {
    if ((type.flags & ts.TypeFlags.Object) === 0) return false;
    const declared = type.symbol?.declarations?.some((one) =>
      one.getSourceFile().fileName.startsWith(this.#libraryFolder),
    );
    return declared === true && MEMBERS.some((name) => type.getProperty(name) !== undefined);
  }

  /** Whether a parameter of this type takes exact rational numbers. */
  takesRational(type: TS.Type): boolean {
    return members(this.#known(type)).some((part) => part.symbol?.name === "Rational" && this.isLibrary(part));
  }

  /** "a point", "a number", "a value of type Date". */
  describe(type: TS.Type): string {
    const parts = members(type);
    if (parts.length > 1) {
      if (parts.every((part) => (part.flags & ts.TypeFlags.BooleanLike) !== 0)) return "a truth value";
      return [...new Set(parts.map((part) => this.describe(part)))].join(" or ");
    }
    const known = this.#known(type);
    if (known.flags & ts.TypeFlags.NumberLike) return "a number";
    if (known.flags & ts.TypeFlags.BigIntLike) return "a bigint";
    if (known.flags & ts.TypeFlags.StringLike) return "a text";
    if (known.flags & ts.TypeFlags.BooleanLike) return "a truth value";
    if (known.flags & (ts.TypeFlags.Undefined | ts.TypeFlags.Void)) return "undefined";
    if (known.flags & ts.TypeFlags.Null) return "null";
    if (known.flags & ts.TypeFlags.Unknown) return "a value of unknown type";
    const name = known.symbol?.name ?? "";
    return (this.isLibrary(known) && WORDS[name]) || `a value of type ${this.#checker.typeToString(type)}`;
  }

  /** A type parameter stands for what it extends. */
  #known(type: TS.Type): TS.Type {
    if ((type.flags & ts.TypeFlags.Instantiable) === 0) return type;
    return this.#checker.getBaseConstraintOfType(type) ?? type;
  }
}

/** The alternatives of a type. */
export function members(type: TS.Type): readonly TS.Type[] {
  return type.isUnion() ? type.types : [type];
}
