// Text into HTML.

const ENTITIES: Readonly<Record<string, string>> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "'": "&#39;",
};

export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => ENTITIES[character] ?? character);
}

/** The text that HTML character references stand for, for the few names that occur in formulas. */
export function decodeEntities(html: string): string {
  return html.replace(/&(?:#(\d{1,7})|#x([\da-f]{1,6})|(amp|lt|gt|quot|apos|nbsp));/gi, (whole, decimal, hex, name) => {
    if (name)
      return { amp: "&", lt: "<", gt: ">", quot: '"', apos: "'", nbsp: "\u00A0" }[String(name).toLowerCase()] ?? whole;
    const code = decimal ? Number(decimal) : Number.parseInt(hex, 16);
    return code > 0 && code <= 0x10ffff ? String.fromCodePoint(code) : whole;
  });
}
