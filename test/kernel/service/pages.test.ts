import { expect, it } from "vitest";
import { onePage } from "../../../kernel/service/pages.ts";

const page = (data: object) => ({ source: "page", data, start: 0 });
const next = { source: "set_next_input", text: "x", replace: false };

it("all pages are one, for a front end that shows one a reply — oracle: what was put in, in its order", () => {
  const payload = [page({ "text/plain": "a" }), next, page({ "text/plain": "b" })];
  expect(onePage(payload)).toEqual([page({ "text/plain": "a\n\nb" }), next]);
  expect(onePage([next])).toEqual([next]);
});

it("a figure is HTML too, text beside it is escaped — oracle: the markup written by hand", () => {
  const figure = { "text/plain": "a curve", "image/svg+xml": "<svg/>" };
  expect(onePage([page(figure)])).toEqual([page({ ...figure, "text/html": "<svg/>" })]);
  expect(onePage([page(figure), page({ "text/plain": "1 < 2 & 3" })])).toEqual([
    page({
      "text/plain": "a curve\n\n1 < 2 & 3",
      "text/html": "<div><svg/></div>\n<div><pre>1 &lt; 2 &amp; 3</pre></div>",
    }),
  ]);
});
