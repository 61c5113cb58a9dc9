// The one place where positions cross the border: the wire counts Unicode code points, JavaScript counts UTF-16 units.

/**
 * UTF-16 offset of a code point position. A position that is no number is the end of the text; one out of range or
 * broken is moved to the nearest that exists.
 */
export function toUnits(text: string, position: unknown): number {
  if (typeof position !== "number" || Number.isNaN(position)) return text.length;
  const wanted = Math.floor(Math.max(0, position));
  if (wanted >= text.length) return text.length; // a text has no more code points than units
  let units = 0;
  for (let points = 0; points < wanted && units < text.length; points += 1) units += widthAt(text, units);
  return units;
}

/** Code points before a UTF-16 offset; an offset inside a pair counts the pair. */
export function toCodePoints(text: string, units: number): number {
  let points = 0;
  for (let at = 0; at < units && at < text.length; points += 1) at += widthAt(text, at);
  return points;
}

function widthAt(text: string, units: number): 1 | 2 {
  return (text.codePointAt(units) ?? 0) > 0xffff ? 2 : 1;
}
