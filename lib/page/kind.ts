import type { ConventionKey } from "../proof/conventions.ts";
import type { Decimal } from "./digits.ts";

/** JSON with every number written as a string. */
export type Data = string | boolean | null | readonly Data[] | { readonly [key: string]: Data };

/** A decimal number in a cell, real or complex: digits stand under digits. */
export interface NumberCell {
  readonly kind: "number";
  readonly re?: Decimal;
  readonly im?: Decimal;
}

/** A value in a cell of a table. */
export type Cell =
  | NumberCell
  | { readonly kind: "formula"; readonly text: string; readonly tex: string }
  | { readonly kind: "words"; readonly text: string };

/** How a number is shown with few digits. */
export interface ShortPart {
  text(value: unknown): string;
  tex(value: unknown): string;
}

export interface ShortForm {
  readonly text: string;
  readonly tex: string;
}

/** How values inside a value are shown; handed to each renderer. */
export interface Show {
  /** The short form of a value that has one. */
  short(value: unknown, part: ShortPart): ShortForm | undefined;
  text(value: unknown): string;
  /** A formula without delimiters. */
  tex(value: unknown): string;
  cell(value: unknown): Cell;
  conventions(value: unknown): readonly ConventionKey[];
  data(value: unknown): Data;
}

/** How one class of values is shown. */
export interface Kind<T> {
  /** One line, or several; ungrouped, so that it can be read back. */
  text(value: T, show: Show): string;
  /** A formula without delimiters; kinds without one are shown by their text or their HTML. */
  tex?(value: T, show: Show): string;
  /** Running text with $formulas$, in place of one displayed formula. */
  prose?(value: T, show: Show): string;
  /** The value in a line of text, where it has a shorter form than its own; `part` shows a number with few digits. */
  short?(value: T, part: ShortPart): ShortForm;
  html?(value: T, show: Show): string;
  svg?(value: T): string;
  cell?(value: T, show: Show): Cell;
  /** The rows of the conventions that a reader needs beside this value. */
  conventions?(value: T, show: Show): readonly ConventionKey[];
  data(value: T, show: Show): Data;
}

/** A class as a key: abstract ones and those with private constructors too. */
export type ClassOf<T> = abstract new (...parameters: never) => T;

export interface KindEntry {
  is(value: object): boolean;
  readonly kind: Kind<never>;
}

/** One line of the table of kinds; the types of class and renderer are matched here and nowhere else. */
export function entry<T extends object>(of: { readonly prototype: T }, kind: Kind<T>): KindEntry {
  const maker = of as unknown as ClassOf<T>;
  return { is: (value) => value instanceof maker, kind: kind as unknown as Kind<never> };
}

/** The same for data without a class, known by their shape. */
export function shape<T extends object>(is: (value: object) => value is T, kind: Kind<T>): KindEntry {
  return { is, kind: kind as unknown as Kind<never> };
}
