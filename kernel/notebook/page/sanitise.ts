// HTML and SVG from notebooks, made fit to stand in a page of ours. Nothing of the input is copied through: it is read
// tag by tag and written anew from lists of what is allowed, so that no script, no event handler, no address outside
// the page and no unclosed element can get out of its place.

export interface SanitiseOptions {
  /** Put before every id and every reference to one, since many outputs share a page. */
  readonly idPrefix?: string;
  /** Turns a run of text (still with its character references) into HTML of ours. */
  readonly text?: (html: string) => string;
}

const words = (list: string): ReadonlySet<string> => new Set(list.split(/\s+/));

const HTML = words(
  `a abbr b bdi bdo blockquote br caption cite code col colgroup dd del details dfn div dl dt em figcaption figure
   h1 h2 h3 h4 h5 h6 hr i img ins kbd li mark ol p pre q s samp section small span strong sub summary sup table tbody
   td tfoot th thead time tr u ul var wbr`,
);
const SVG = words(
  `svg g path line polyline polygon circle ellipse rect text tspan textPath title desc defs clipPath mask marker pattern
   linearGradient radialGradient stop use symbol style`,
);
const VOID = words("br col hr img wbr");
/** Left out with all that they hold: their content is no text for a reader. */
const SWALLOWED = words(
  `script style iframe object embed noscript noembed noframes template textarea title xmp plaintext select svg math
   foreignobject audio video canvas form button head`,
);
const ATTRIBUTES = words(
  "class id title lang dir role style colspan rowspan scope headers align valign alt width height src href start open datetime",
);
const ID_LISTS = words("headers aria-labelledby aria-describedby aria-controls");

const TAG = /<(\/?)([a-zA-Z][^\s/>]*)((?:"[^"]*"|'[^']*'|[^'">])*)>/y;
const ATTRIBUTE = /([^\s=/"'<>]+)(?:\s*=\s*(?:"([^"]*)"|'([^']*)'|([^\s"'<>`]+)))?/g;

/** Clean HTML for a fragment of HTML or SVG; always well formed. */
export function sanitise(html: string, options: SanitiseOptions = {}): string {
  return new Writer(html, options).write();
}

interface Tag {
  readonly closing: boolean;
  readonly name: string;
  readonly attributes: string;
  readonly selfClosing: boolean;
  readonly end: number;
}

class Writer {
  readonly #source: string;
  readonly #prefix: string;
  readonly #text: (html: string) => string;
  readonly #open: string[] = [];
  #out = "";
  #at = 0;

  constructor(source: string, { idPrefix = "", text = cleanText }: SanitiseOptions) {
    this.#source = source;
    this.#prefix = idPrefix;
    this.#text = text;
  }

  write(): string {
    while (this.#at < this.#source.length) this.#step();
    while (this.#open.length > 0) this.#close();
    return this.#out;
  }

  #step(): void {
    const next = this.#source.indexOf("<", this.#at);
    const end = next < 0 ? this.#source.length : next;
    if (end > this.#at) this.#emitText(this.#source.slice(this.#at, end));
    this.#at = end;
    if (next >= 0) this.#markup();
  }

  #emitText(html: string): void {
    const inSvg = this.#inSvg();
    const verbatim = inSvg || this.#open.includes("pre") || this.#open.includes("code");
    this.#out += verbatim ? cleanText(html) : this.#text(html);
  }

  #markup(): void {
    const tag = this.#readTag();
    if (tag) {
      this.#at = tag.end;
      if (tag.closing) this.#end(tag.name);
      else this.#start(tag);
    } else if (this.#source.startsWith("<!--", this.#at)) this.#skipPast("-->");
    else if (/[!?]/.test(this.#source[this.#at + 1] ?? "")) this.#skipPast(">");
    else {
      this.#out += "&lt;";
      this.#at++;
    }
  }

  #skipPast(mark: string): void {
    const found = this.#source.indexOf(mark, this.#at);
    this.#at = found < 0 ? this.#source.length : found + mark.length;
  }

  #readTag(): Tag | undefined {
    TAG.lastIndex = this.#at;
    const match = TAG.exec(this.#source);
    if (!match) return undefined;
    const [whole, slash = "", name = "", attributes = ""] = match;
    const selfClosing = /\/\s*$/.test(attributes);
    return { closing: slash === "/", name, attributes, selfClosing, end: this.#at + whole.length };
  }

  #inSvg(): boolean {
    return this.#open.includes("svg");
  }

  #start(tag: Tag): void {
    const inSvg = this.#inSvg() || tag.name.toLowerCase() === "svg";
    const name = inSvg ? svgName(tag.name) : tag.name.toLowerCase();
    if (inSvg && name === "style") this.#styleSheet(tag);
    else if (inSvg ? SVG.has(name) : HTML.has(name)) this.#element(tag, name, inSvg);
    else if (SWALLOWED.has(name.toLowerCase()) && !tag.selfClosing) this.#swallow(tag.name);
  }

  #element(tag: Tag, name: string, inSvg: boolean): void {
    const empty = inSvg ? tag.selfClosing : VOID.has(name);
    this.#out += `<${name}${this.#attributes(tag.attributes, inSvg)}${inSvg && empty ? "/" : ""}>`;
    if (!empty) this.#open.push(name);
  }

  #end(rawName: string): void {
    const name = this.#inSvg() ? svgName(rawName) : rawName.toLowerCase();
    // An end tag reaches no further than the picture it stands in.
    const depth = this.#open.lastIndexOf(name);
    if (depth < 0 || (name !== "svg" && depth < this.#open.lastIndexOf("svg"))) return;
    while (this.#open.length > depth) this.#close();
  }

  #close(): void {
    this.#out += `</${this.#open.pop()}>`;
  }

  #swallow(name: string): void {
    const closer = new RegExp(`</${name.replace(/[^\w-]/g, "")}\\s*>`, "gi");
    closer.lastIndex = this.#at;
    this.#at = closer.exec(this.#source) ? closer.lastIndex : this.#source.length;
  }

  /** A style sheet inside a picture: kept if it names nothing outside the page. */
  #styleSheet(tag: Tag): void {
    if (tag.selfClosing) return;
    const from = this.#at;
    this.#swallow(tag.name);
    const css = this.#source
      .slice(from, this.#at)
      .replace(/<\/style\s*>$/i, "")
      .replace(/<!\[CDATA\[|\]\]>/g, "");
    if (/[<&\\]|@(?!media\b)/.test(css) || !isLocal(css)) return;
    this.#out += `<style>${this.#localUrls(css)}</style>`;
  }

  #attributes(source: string, inSvg: boolean): string {
    let out = "";
    for (const [, rawName = "", double, single, bare] of source.matchAll(ATTRIBUTE)) {
      const value = double ?? single ?? bare ?? "";
      const name = inSvg ? rawName : rawName.toLowerCase();
      const kept = this.#keep(name, value, inSvg);
      if (kept !== undefined) out += ` ${name}="${quoted(kept)}"`;
    }
    return out;
  }

  /** The value under which an attribute is kept; undefined: not kept. */
  #keep(name: string, value: string, inSvg: boolean): string | undefined {
    const allowed = inSvg ? isSvgAttribute(name) : ATTRIBUTES.has(name) || /^aria-[a-z]+$/.test(name);
    if (!allowed) return undefined;
    if (name === "id") return this.#named(value);
    if (ID_LISTS.has(name)) return value.replace(/\S+/g, (id) => this.#named(id));
    if (name === "href" || name === "xlink:href" || name === "src")
      return this.#address(value, inSvg || name === "src");
    if (name === "style" || inSvg) return isLocal(value) ? this.#localUrls(value) : undefined;
    return value;
  }

  /** Steps of derivations keep their names, which text elsewhere in the page cites. */
  #named(id: string): string {
    return id.startsWith("step-") ? id : this.#prefix + id;
  }

  /** Addresses: into the page, a picture in the page itself, or (for links only) an ordinary web or mail address. */
  #address(value: string, embedded: boolean): string | undefined {
    if (/^#[\w:.-]+$/.test(value)) return `#${this.#named(value.slice(1))}`;
    if (/^data:image\/(?:png|jpeg|gif|webp);base64,[\w+/=\s]+$/.test(value)) return embedded ? value : undefined;
    return !embedded && /^(?:https?:\/\/|mailto:)[^\s]+$/i.test(value) ? value : undefined;
  }

  #localUrls(css: string): string {
    return css.replace(/url\(\s*(["']?)#([\w:.-]+)\1\s*\)/gi, (_, __, id) => `url(#${this.#prefix}${id})`);
  }
}

/** Text with its own character references kept and nothing that could be read as markup. */
function cleanText(html: string): string {
  return html.replace(/>/g, "&gt;");
}

function quoted(value: string): string {
  return value.replace(/"/g, "&quot;").replace(/</g, "&lt;").replace(/>/g, "&gt;");
}

function svgName(name: string): string {
  const exact = [...SVG].find((known) => known.toLowerCase() === name.toLowerCase());
  return exact ?? name.toLowerCase();
}

function isSvgAttribute(name: string): boolean {
  return /^(?:xlink:|xml:)?[a-zA-Z][a-zA-Z-]*\d?$/.test(name) && !/^on/i.test(name);
}

/** Does a style value keep to the page: no address but url(#id), nothing that old engines execute? */
function isLocal(css: string): boolean {
  const rest = css.replace(/url\(\s*(["']?)#[\w:.-]+\1\s*\)/gi, "");
  return !/url\s*\(|image-set|expression|javascript:|behavior|-moz-binding|@import|position\s*:|\\|&/i.test(rest);
}
