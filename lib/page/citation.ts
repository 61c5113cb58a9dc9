// Words of a step in which {label} cites another step of the same derivation.

import { anchorOf, type Derivation } from "./derivation.ts";
import { splitFormulas } from "./tex.ts";

/** A piece of a step's words: text with its $formulas$, or the number of a step with the name by which links find it. */
export type CitedPiece = { readonly text: string } | { readonly number: string; readonly anchor: string };

/** The words taken apart at their citations; braces that hold no label of the derivation stay as they are. */
export function citedPieces(derivation: Derivation, text: string): CitedPiece[] {
  return splitFormulas(text).flatMap((piece): CitedPiece[] => {
    if (piece.formula) return [{ text: `$${piece.text}$` }];
    return piece.text.split(/(\{[\w-]+\})/).flatMap((part): CitedPiece[] => {
      const label = /^\{([\w-]+)\}$/.exec(part)?.[1];
      const place = derivation.steps.findIndex((step) => label !== undefined && step.label === label);
      if (place >= 0) return [{ number: `(${place + 1})`, anchor: anchorOf(derivation, label) }];
      return part === "" ? [] : [{ text: part }];
    });
  });
}

/** The words with the numbers put in. */
export function citedText(derivation: Derivation, text: string): string {
  return citedPieces(derivation, text)
    .map((piece) => ("anchor" in piece ? piece.number : piece.text))
    .join("");
}
