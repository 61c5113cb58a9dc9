import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bundle } from "../../../lib/page/bundle.ts";
import { plainText } from "../../../lib/page/plain.ts";

describe("plain JavaScript values as text", () => {
  it("names a number that is not whole for what it is", () => {
    expect(plainText(0.1)).toBe("0.1   (a double, not proved)");
    expect(plainText(3)).toBe("3");
    expect(plainText(-0)).toBe("-0");
    expect(plainText(Number.NaN)).toBe("NaN");
  });

  it("lists, records, maps, sets, bigints, nested and empty — oracle: written by hand", () => {
    expect(plainText([1, [2n, "a"], { b: true, "c d": null }])).toBe('[1, [2n, "a"], { b: true, "c d": null }]');
    expect(plainText(new Map([["k", new Set([1])]]))).toBe('Map {"k" → Set {1}}');
    expect(plainText([])).toBe("[]");
    expect(plainText({})).toBe("{}");
    expect(plainText(new Array(2))).toBe("[(empty), (empty)]");
    expect(plainText(new Float64Array([0.5, 2]))).toBe("Float64Array [0.5, 2]   (a double, not proved)");
    expect(plainText([1, [0.1, 0.2]])).toBe("[1, [0.1, 0.2]]   (doubles, not proved)");
    expect(plainText([undefined, Symbol("s"), function f() {}, class A {}])).toBe(
      "[undefined, Symbol(s), function f, class A]",
    );
    expect(plainText(new RangeError("too far"))).toBe("RangeError: too far");
  });

  it("runs no getter and calls no method of the value", () => {
    const calls: string[] = [];
    const value = {
      get x(): number {
        calls.push("x");
        return 1;
      },
      toString: () => calls.push("toString") && "",
      toJSON: () => calls.push("toJSON") && "",
    };
    bundle(value);
    bundle([value]);
    expect(plainText(value)).toContain("x: (computed when read)");
    expect(calls).toEqual([]);
  });

  it("a cycle, a promise, a revoked proxy and a hostile proxy are shown, not thrown", () => {
    const cycle: unknown[] = [1];
    cycle.push(cycle);
    expect(plainText(cycle)).toBe("[1, [the same object again]]");
    expect(plainText(Promise.resolve(1))).toContain("await");
    const { proxy, revoke } = Proxy.revocable({}, {});
    revoke();
    expect(bundle(proxy)?.["text/plain"]).toContain("[an object that cannot be looked at]");
    const hostile = new Proxy(
      {},
      {
        getPrototypeOf: () => {
          throw {
            toString: () => {
              throw 1;
            },
          };
        },
      },
    );
    expect(typeof bundle(hostile)?.["text/plain"]).toBe("string");
    expect(bundle(undefined)).toBeUndefined();
  });

  it("is bounded for large values", () => {
    const wide = Object.fromEntries(Array.from({ length: 5000 }, (_, k) => [`k${k}`, "x".repeat(500)]));
    expect(plainText(wide).length).toBeLessThan(25_000);
    expect(plainText(Array.from({ length: 1e6 }, () => 1)).length).toBeLessThan(1000);
    expect(plainText("y".repeat(1e6)).length).toBeLessThan(25_000);
    const deep = Array.from({ length: 5000 }).reduce<unknown>((inner) => [inner], 1);
    expect(plainText(deep)).toBe("[[[[[...]]]]]");
  });

  it("a long list is looked at only as far as it is shown", () => {
    let reads = 0;
    const counted = new Proxy(new Array(1_000_000).fill(1), {
      getOwnPropertyDescriptor: (target, key) => {
        reads++;
        return Reflect.getOwnPropertyDescriptor(target, key);
      },
    });
    expect(bundle(counted)?.["text/plain"]).toContain("999900 more");
    expect(reads).toBeLessThan(1000);
  });

  it("any value gives a bundle with text, and never throws", () => {
    fc.assert(
      fc.property(
        fc.anything({ withBigInt: true, withMap: true, withSet: true, withTypedArray: true, withNullPrototype: true }),
        (value) => {
          const shown = bundle(value);
          expect(shown === undefined || typeof shown["text/plain"] === "string").toBe(true);
        },
      ),
      { numRuns: 1000, seed: 3 },
    );
  });
});
