// The few error classes of the library, told apart by what a caller does next. Data first, prose second.

/** What went wrong, as data: who speaks, what was given, what was expected, what to do. */
export interface Complaint {
  /** The public name that was called, such as "lattice" or "wp". */
  readonly subject: string;
  /** What was given, with its values printed. */
  readonly given: string;
  readonly expected: string;
  /** What to do about it: the nearest valid request. */
  readonly hint?: string;
  /** Name of the offending argument. */
  readonly argument?: string;
}

/** Base of all errors that the library throws on purpose; `message` is made from the fields. */
export abstract class LibraryError extends Error implements Complaint {
  readonly subject: string;
  readonly given: string;
  readonly expected: string;
  readonly hint: string;
  readonly argument: string;

  constructor(complaint: Complaint) {
    const { subject, given, expected, hint = "", argument = "" } = complaint;
    super(`${subject}: ${given}; expected ${expected}.${hint ? ` ${hint}` : ""}`);
    this.name = new.target.name;
    this.subject = subject;
    this.given = given;
    this.expected = expected;
    this.hint = hint;
    this.argument = argument;
  }
}

/** An argument outside the domain of the function: another argument is needed. */
export class DomainError extends LibraryError {}

/** An argument at a pole, or an enclosure that holds one. */
export class PoleError extends LibraryError {}

/** An enclosure that meets a branch cut: choose a branch, or give a sharper argument. */
export class BranchError extends LibraryError {}

/** The digits asked for were not reached within the limit: ask for fewer, or give a sharper argument. */
export class PrecisionError extends LibraryError {}

/** A yes or no was needed and the enclosures allow both. */
export class UndecidedError extends LibraryError {}
