// The text that is checked is the user's text with small edits, and positions are mapped both ways.

/** Replaces [start, end) of the user's text. An insertion has start = end. */
export interface Edit {
  readonly start: number;
  readonly end: number;
  readonly text: string;
}

interface Piece {
  /** Offset in the edited text. */
  readonly at: number;
  /** Offset in the user's text. */
  readonly from: number;
  readonly length: number;
  /** A copied piece has its positions one to one; an edited one maps to where it stands. */
  readonly copied: boolean;
}

/** Edits in the order of their places; those at one place keep the order in which they were made. */
export function inOrder(edits: readonly Edit[]): Edit[] {
  return [...edits].sort((a, b) => a.start - b.start);
}

/** A text after edits, with the way there and back. */
export class EditedText {
  readonly text: string;
  readonly userLength: number;
  readonly #pieces: Piece[] = [];

  /** `edits` in the order in which they are to appear; they must not overlap. */
  constructor(user: string, edits: readonly Edit[]) {
    let text = "";
    let from = 0;
    for (const edit of edits) {
      this.#pieces.push({ at: text.length, from, length: edit.start - from, copied: true });
      text += user.slice(from, edit.start);
      this.#pieces.push({ at: text.length, from: edit.start, length: edit.text.length, copied: false });
      text += edit.text;
      from = edit.end;
    }
    this.#pieces.push({ at: text.length, from, length: user.length - from, copied: true });
    this.text = text + user.slice(from);
    this.userLength = user.length;
  }

  /** Offset in the user's text for an offset in the edited one; beyond the end it is the end. */
  toUser(offset: number): number {
    let low = 0;
    let high = this.#pieces.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((this.#pieces[middle] as Piece).at <= offset) low = middle + 1;
      else high = middle;
    }
    const piece = this.#pieces[low - 1];
    if (!piece) return 0;
    return Math.min(
      this.userLength,
      piece.copied ? piece.from + Math.min(offset - piece.at, piece.length) : piece.from,
    );
  }

  /** Offset in the edited text for an offset in the user's one: behind what is inserted there. */
  toEdited(offset: number): number {
    const piece = this.#pieces.findLast((candidate) => candidate.copied && candidate.from <= offset);
    return piece ? piece.at + Math.min(offset - piece.from, piece.length) : 0;
  }
}
