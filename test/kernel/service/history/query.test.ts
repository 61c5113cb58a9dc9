import fc from "fast-check";
import { expect, it } from "vitest";
import { globMatcher } from "../../../../kernel/service/history/glob.ts";
import { answerHistory } from "../../../../kernel/service/history/query.ts";
import { openHistory } from "../../../../kernel/service/history/store.ts";

async function filled() {
  const entries = ["old 1", "old 2"].map((input, at) => ({ session: 4, line: at + 1, input, output: null }));
  const history = await openHistory({
    load: async () => ({ session: 5, entries }),
    append: () => {},
    close: async () => {},
  });
  for (const [at, input] of ["E", "L = E.lattice()", "E", "π"].entries()) history.add(at + 1, input);
  history.entries()[2]!.output = "y² = x³ − x";
  return history;
}
const history = await filled();
const ask = (request: object) => answerHistory(request as Record<string, unknown>, history);

it("tail gives the last n, oldest first, over sessions — oracle: protocol", () => {
  expect(ask({ hist_access_type: "tail", n: 5 })).toEqual([
    [4, 2, "old 2"],
    [5, 1, "E"],
    [5, 2, "L = E.lattice()"],
    [5, 3, "E"],
    [5, 4, "π"],
  ]);
  expect(ask({ hist_access_type: "tail", n: 1, output: true })).toEqual([[5, 4, ["π", null]]]);
});

it("range counts sessions back, takes negative lines, stops before stop — oracle: protocol", () => {
  const range = (more: object) => ask({ hist_access_type: "range", raw: true, output: false, ...more });
  expect(range({ session: 0, start: 2, stop: 4 })).toEqual([
    [5, 2, "L = E.lattice()"],
    [5, 3, "E"],
  ]);
  expect(range({ session: -1, start: 1, stop: null })).toEqual([
    [4, 1, "old 1"],
    [4, 2, "old 2"],
  ]);
  expect(range({ session: 4, start: -1 })).toEqual([[4, 2, "old 2"]]);
  expect(range({ session: 0, start: 1, stop: 2, output: true })).toEqual([[5, 1, ["E", "y² = x³ − x"]]]);
  expect(range({ session: 77 })).toEqual([]);
});

it("search is a glob over the whole input; unique keeps the latest of equals — oracle: protocol", () => {
  const search = (more: object) => ask({ hist_access_type: "search", ...more });
  expect(search({ pattern: "E" })).toEqual([
    [5, 1, "E"],
    [5, 3, "E"],
  ]);
  expect(search({ pattern: "E", unique: true })).toEqual([[5, 3, "E"]]);
  expect(search({ pattern: "*E*", n: 1 })).toEqual([[5, 3, "E"]]);
  expect(search({ pattern: "o?d [(*" })).toEqual([]);
  expect(search({ pattern: "?", unique: true }).length).toBe(2);
});

it.each([
  [{}],
  [{ hist_access_type: "all" }],
  [{ hist_access_type: "tail", n: -3 }],
  [{ hist_access_type: 4, n: "x" }],
])("%j finds nothing and fails nothing — oracle: protocol, tolerate", (request) => expect(ask(request)).toEqual([]));

it("null fields count as absent — oracle: protocol", () => {
  expect(ask({ hist_access_type: "tail", n: null, unique: null, output: null }).length).toBe(6);
});

it("the glob agrees with a regular expression — oracle: second algorithm", () => {
  const letters = fc.string({ unit: fc.constantFrom("a", "b", "?", "*", "."), maxLength: 8 });
  const text = fc.string({ unit: fc.constantFrom("a", "b", "."), maxLength: 10 });
  fc.assert(
    fc.property(letters, text, (glob, input) => {
      const pattern = glob.replaceAll(".", "\\.").replaceAll("?", ".").replaceAll("*", ".*");
      expect(globMatcher(glob)(input)).toBe(new RegExp(`^${pattern}$`, "s").test(input));
    }),
    { numRuns: 3000, seed: 3 },
  );
});

it("a hostile glob takes no exponential time — oracle: an exponential search would outlive the test", () => {
  expect(globMatcher("*a".repeat(200))(`${"a".repeat(5000)}b`)).toBe(false);
});
