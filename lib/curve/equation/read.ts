// Reading an equation template over Q: from the strings and slots of the tag to a polynomial with its letters.

import type { Field } from "../../algebra/field.ts";
import { isHomogeneous, type Polynomial } from "../../algebra/multivariate.ts";
import { parseEquation } from "./parser.ts";
import { type Letter, lettersOf, polynomialOf, type Reading } from "./polynomial.ts";
import { faultAt, type Source, sourceOf } from "./source.ts";

/** A template that has been read: left side minus right side, and both where a message has to point. */
export interface ReadEquation<T> {
  readonly source: Source;
  readonly letters: readonly Letter[];
  readonly polynomial: Polynomial<T>;
  readonly field: Field<T>;
}

/** What a template was given in its slots. */
export interface Slots<T> {
  readonly printed: readonly string[];
  readonly reading: Reading<T>;
}

/**
 * The polynomial of one equation in all the letters that it names, in alphabetical order.
 * `affine` letters are allowed, or one more in a homogeneous equation; a letter too many is refused where it stands first.
 */
export function readEquation<T>(
  subject: string,
  strings: readonly string[],
  { printed, reading }: Slots<T>,
  affine: number,
): ReadEquation<T> {
  const source = sourceOf(subject, strings, printed);
  const tree = parseEquation(source);
  const letters = lettersOf(tree);
  if (letters.length > affine + 1) throw tooManyLetters(source, letters, affine);
  const names = letters.map(({ name }) => name).sort();
  const polynomial = polynomialOf(source, tree, names, reading);
  if (letters.length > affine && !isHomogeneous(polynomial)) throw tooManyLetters(source, letters, affine);
  return { source, letters, polynomial, field: reading.field };
}

/** The letter to blame: one that is no usual coordinate, if there is such a one, else the last to appear. */
function tooManyLetters(source: Source, letters: readonly Letter[], affine: number) {
  const usual = /^[xyzuvwstXYZUVWST]\d*$/;
  const unknown = letters.find(({ name }) => !usual.test(name)) ?? letters.at(-1)!;
  const names = letters.map(({ name }) => name).join(", ");
  return faultAt(source, {
    offset: unknown.offset,
    length: unknown.length,
    given: `the unknown letter ${unknown.name} (the letters here are ${names})`,
    expected: `${affine} coordinates, or ${affine + 1} in a homogeneous equation`,
    hint: `Insert a number as \${${unknown.name}}.`,
  });
}
