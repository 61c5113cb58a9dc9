import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { sanitise } from "../../../../kernel/notebook/page/sanitise.ts";

describe("cleaning HTML", () => {
  it.each([
    ["a script", "a<script>alert(1)</script>b", "ab"],
    ["a script that is never closed", "a<script>alert(1)", "a"],
    ["an event handler", '<b onclick="x()" title="t">b</b>', '<b title="t">b</b>'],
    ["an unknown element, keeping its text", "<blink>a</blink>", "a"],
    ["a frame with all it holds", "<iframe src='x'><b>a</b></iframe>c", "c"],
    ["a script address", '<a href="javascript:x()">a</a>', "<a>a</a>"],
    ["a script address behind references", '<a href="java&#115;cript:x()">a</a>', "<a>a</a>"],
    ["a picture from outside", '<img src="https://x.example/a.png" alt="p">', '<img alt="p">'],
    ["a style that fetches", '<p style="background:url(https://x.example)">a</p>', "<p>a</p>"],
    ["a style that hides its letters", '<p style="b\\61ckground:red">a</p>', "<p>a</p>"],
    ["a comment", "a<!-- <b> -->c", "ac"],
    ["a lone angle", "1 < 2", "1 &lt; 2"],
    ["an end without a start", "</div></section>a", "a"],
    ["a script in a picture", "<svg><script>x</script><g onload='x'/></svg>", "<svg><g/></svg>"],
    ["foreign content in a picture", "<svg><foreignObject><b>a</b></foreignObject></svg>", "<svg></svg>"],
    ["a link out of a picture", '<svg><use href="https://x.example#a"/></svg>', "<svg><use/></svg>"],
    ["a style sheet that imports", "<svg><style>@import 'x';</style></svg>", "<svg></svg>"],
  ])("takes out %s", (_, html, clean) => expect(sanitise(html)).toBe(clean));

  it("keeps tables, links, pictures in the page and formulas in text", () => {
    const html = '<table><tr><th scope="col">a</th></tr></table><a href="https://x.example/?a=1&amp;b=2">l</a>';
    expect(sanitise(html)).toBe(html);
    expect(sanitise('<img src="data:image/png;base64,AAAA" alt="">')).toBe(
      '<img src="data:image/png;base64,AAAA" alt="">',
    );
    expect(sanitise("<td>$x$</td><code>$x$</code>", { text: (t) => t.toUpperCase() })).toBe(
      "<td>$X$</td><code>$x$</code>",
    );
  });

  it("closes what is open, so that nothing leaks into the page", () => {
    expect(sanitise("<div><table><tr><td>a")).toBe("<div><table><tr><td>a</td></tr></table></div>");
    expect(sanitise("<div><svg><g></div>b</svg>c</div>d")).toBe("<div><svg><g>b</g></svg>c</div>d");
  });

  it("keeps names of SVG in their spelling and prefixes every reference", () => {
    const svg =
      '<svg viewbox="0 0 1 1" aria-labelledby="t"><title id="t">T</title><defs><clippath id="c"><rect width="1"/></clippath></defs><g clip-path="url(#c)" style="fill:url(#c)"/><use href="#c"/></svg>';
    expect(sanitise(svg, { idPrefix: "o1-" })).toBe(
      '<svg viewbox="0 0 1 1" aria-labelledby="o1-t"><title id="o1-t">T</title><defs><clipPath id="o1-c"><rect width="1"/></clipPath></defs><g clip-path="url(#o1-c)" style="fill:url(#o1-c)"/><use href="#o1-c"/></svg>',
    );
  });

  it("is stable and never lets a dangerous tag or attribute through — random markup, cleaned twice", () => {
    const piece = fc.constantFrom(
      ..."<script>|</script>|<svg>|</svg>|<style>|</style>|<title>|</title>|<b onclick=x>|</b>|<img src=x onerror=y>|<!--|-->|<math>|<a href='javascript:a'>|\"|'|>|<|&lt;|text|<desc>|<g/>|<p|/>|<iframe>|]]>|<![CDATA[".split(
        "|",
      ),
    );
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 12 }), (parts) => {
        const once = sanitise(parts.join(""));
        expect(once).not.toMatch(/<(?:script|iframe|math|object)/i);
        expect(once.replace(/"[^"]*"/g, "")).not.toMatch(/<[^>]*\son\w+=|<[^>]*javascript:/i);
        expect(sanitise(once)).toBe(once);
      }),
      { numRuns: 2000, seed: 7 },
    );
  });
});

it("steps of derivations keep their names, so that text elsewhere in the page reaches them", () => {
  const html =
    '<li id="step-torsion-bound"><details open><summary>(4)</summary><a href="#step-torsion-curve">(1)</a></details></li>';
  expect(sanitise(`<ol>${html}</ol>`, { idPrefix: "o3-" })).toBe(
    `<ol>${html.replace("<details open>", '<details open="">')}</ol>`,
  );
});
