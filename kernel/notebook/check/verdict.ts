// What a comparison can say, from best to worst, with what it rests on.

export type Finding =
  /** Exact values are equal, or enclosures overlap and are as sharp as before. */
  | "same"
  /** Only words differ: the value carries no data to compare. */
  | "other words"
  /** Compatible, but known less well than is stored: a wide enclosure, or a lower standing. */
  | "weaker"
  /** Proved different, or not to be compared. */
  | "differs"
  /** The cell fails now. */
  | "fails";

const ORDER: readonly Finding[] = ["same", "other words", "weaker", "differs", "fails"];

export interface Verdict {
  readonly finding: Finding;
  /** Where and how, in words; none for "same". */
  readonly notes: readonly string[];
}

export const SAME: Verdict = { finding: "same", notes: [] };

export function verdict(finding: Finding, note: string): Verdict {
  return { finding, notes: [note] };
}

/** The worst finding, with the notes of all that are not "same". */
export function worst(verdicts: readonly Verdict[]): Verdict {
  return verdicts.reduce(
    (all, one) => ({
      finding: ORDER.indexOf(one.finding) > ORDER.indexOf(all.finding) ? one.finding : all.finding,
      notes: [...all.notes, ...one.notes],
    }),
    SAME,
  );
}

/** Does a notebook with this finding still say what is stored? */
export function stands(finding: Finding): boolean {
  return finding === "same" || finding === "other words";
}
