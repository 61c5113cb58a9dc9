/** A stored picture must not depend on the last digit of a double, nor on ids: digits rounded, ids numbered anew. */
export function normalise(svg: string): string {
  const ids = new Map<string, string>();
  return svg
    .replace(/fig-[0-9a-z]+/g, (id) => {
      if (!ids.has(id)) ids.set(id, `id${ids.size + 1}`);
      return ids.get(id) ?? id;
    })
    .replace(/-?\d+\.\d+/g, (number) => String(Math.round(Number(number) * 2) / 2))
    .replace(/></g, ">\n<");
}

/** The elements of a class, as their text. */
export function elements(svg: string, className: string): string[] {
  return [...svg.matchAll(new RegExp(`<[a-z]+ [^>]*class="${className}"[^>]*>`, "g"))].map((match) => match[0]);
}
