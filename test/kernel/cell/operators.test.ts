// Operators and exact literals on library values: what a cell means, and what is refused. The oracle of each value is
// the exact result worked by hand, or the library's own method called by name.
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { TestNotebook } from "./notebook.ts";

let notebook: TestNotebook;
beforeAll(async () => {
  notebook = new TestNotebook();
  await notebook.value(
    "const E = curve`y^2 + y = x^3 - x`, P = E.point(0, 0); const x = real(3), r = rational(1, 3), z = complex(1, 2), w = real(2).sqrt()",
  );
}, 60_000);
afterAll(() => notebook.session.shutdown());

/** A cell, and the text of `String(value)`. */
const VALUES: readonly (readonly [title: string, code: string, expected: string])[] = [
  ["points: sum", "P + P", "(1, 0)"],
  ["points: multiple from the left", "3 * P", "(-1, -1)"],
  ["points: multiple by a bigint from the right", "P * 3n", "(-1, -1)"],
  ["points: negative and difference", "-P - P", "(1, -1)"],
  ["rational: sum with an integer", "r + 1", "4/3"],
  ["rational: an integer before it", "1 - r", "2/3"],
  ["rational: quotient of an integer", "2 / r", "6"],
  ["rational: power", "r ** 2", "1/9"],
  ["a literal quotient is exact", "1/3 * x", "1"],
  ["a decimal literal is exact", "0.1 * x", "3/10"],
  ["a decimal literal alone in a named argument is exact", "legendre.K({ m: 0.5 })", "1.8540746773013719184..."],
  ["sums of literals", "(1 - 1/3 + 0.5) * x", "7/2"],
  ["powers of literals", "2**3**2 * x", "1536"],
  ["negative literals", "-1/3 * x", "-1"],
  ["a literal too long for a double", "123456789012345678901 * x", "370370367037037036703"],
  ["a literal with exponent", "1e-3 * x", "3/1000"],
  ["an argument that takes a library number", "real(1/3) - r", "0"],
  ["an argument of a named option", "((o: { by: Numeric }) => real(o.by))({ by: 1/3 }) - r", "0"],
  // biome-ignore lint/suspicious/noTemplateCurlyInString: the slot is the cell's
  ["a slot of a template", "curve`y^2 = x^3 + ${1/3} x - ${-0.25}`.a.join()", "0,0,0,1/3,1/4"],
  // biome-ignore lint/suspicious/noTemplateCurlyInString: the slot is the cell's
  ["a slot beside a variable", "const n4 = 4; curve`y^2 = x^3 + ${n4} x + ${(1/3)}`.a.join()", "0,0,0,4,1/3"],
  [
    "an element of a list that a generic function takes",
    "curve({ a: [0, 0, 0, 1/3, r > 0 ? 0.5 : 1] }).a.join()",
    "0,0,0,1/3,1/2",
  ],
  ["an option of a generic function", "curve({ j: 1/2 }).j", "1/2"],
  ["unary minus of a variable", "-r", "-1/3"],
  ["number | Real", "((v: number | Real) => v + 1)(2)", "3"],
  ["number | Real, the other one", "((v: number | Real) => v + 1)(x)", "4"],
  ["any", "((v: any, u: any) => v + u)(r, 1)", "4/3"],
  ["any that is plain", "((v: any, u: any) => v + u)('a', 1)", "a1"],
  ["T extends Real | Complex", "(<T extends Real | Complex>(v: T) => v + v)(x).minus(6)", "0"],
  ["T extends number", "(<T extends number>(v: T): number => v * 2 + 1)(4)", "9"],
  ["T extends Rational", "(<T extends Rational>(v: T) => v * 3)(r)", "1"],
  ["string += value", "let s1 = 'r = '; s1 += r; s1", "r = 1/3"],
  ["text + value", "'P is ' + P", "P is (0, 0)"],
  ["value + text", "P + '!'", "(0, 0)!"],
  ["reduce without a seed", "[r, r, r].reduce((a, b) => a + b)", "1"],
  ["reduce with a seed", "[P, P].reduce((a, b) => a + b, E.origin)", "(1, 0)"],
  ["sort with a difference of numbers", "[3, 1, 2].sort((a, b) => a - b).join()", "1,2,3"],
  ["map of a method", "[1, 2, 3].map((n) => n * P).join(' ')", "(0, 0) (1, 0) (-1, -1)"],
  [
    "object, key and old value before the operand",
    "const o1 = { p: [r, r] }; let i1 = 0; const f1 = async () => { o1.p[0] = rational(100); return r }; o1.p[i1++] += await f1(); [i1, o1.p[0]].join()",
    "1,2/3",
  ],
  [
    "compound on a variable, read before the operand",
    "let a1: Rational = r; const bump = () => { a1 = rational(50); return r }; a1 += bump(); a1",
    "2/3",
  ],
  ["s += x on a library value", "let s2 = w; s2 += x; s2 -= w; s2.minus(3).overlaps(0)", "true"],
  ["s += x on a number stays a number", "let n1 = 1; n1 += 2; n1 += [x].length; n1", "4"],
  [
    "a private member behind a call, which is made once",
    "let made = 0; class G1 { #p: Rational = r; static bump(f: () => G1, v: Rational) { f().#p += v; return f().#p } }; const g0 = new G1(), one = () => { made++; return g0 }; [G1.bump(one, r), made].join(' ')",
    "2/3 2",
  ],
  [
    "a private member of a private member",
    "class H1 { #n?: H1; #p: Rational = r; static go(h: H1) { h.#n = new H1(); h.#n.#p *= 6; return h.#n.#p } }; H1.go(new H1())",
    "2",
  ],
  [
    "an element of super, its key evaluated once",
    "let keys = 0, kept: Rational = r; class J1 { get q() { return kept } set q(v: Rational) { kept = v } }; class J2 extends J1 { key(): 'q' { keys++; return 'q' } go() { super[this.key()] += r } }; new J2().go(); [kept, keys].join(' ')",
    "2/3 1",
  ],
  ["Real | undefined, tested first", "const m1: Real | undefined = [x].at(0); m1 ? m1 + 1 : 0", "4"],
  ["compound: each operator", "let c1: Rational = r; c1 -= 1; c1 *= 3; c1 /= 4; c1 **= 2; c1", "1/4"],
  [
    "private members, super, fields, defaults",
    "class A1 { #p: Rational = r; static q = 1/3 * x; m(d = r * 2) { this.#p += 1; return this.#p + d } }; class B1 extends A1 { override m() { return super.m() + 1 } }; new B1().m()",
    "3",
  ],
  [
    "a member of super",
    "class C1 { get v() { return r } }; class D1 extends C1 { twice() { return super.v + super.v } }; new D1().twice()",
    "2/3",
  ],
  [
    "generators",
    "function* g1() { let v: Rational = r; for (;;) { yield v; v *= 2 } }; const it1 = g1(); it1.next(); it1.next().value!",
    "2/3",
  ],
  ["as and !", "(r + r as Rational)! ** 2", "4/9"],
  ["an enum constant", "enum K1 { two = 2, four = two ** 2 }; K1.four * r", "4/3"],
  ["order", "[r < 1, r <= 1/3, r > 0.3, 1 >= x, w < 1.5].join()", "true,true,true,false,true"],
  ["nested in calls and conditions", "(r < 1 ? -r : r) + Number(r.num) * 2", "5/3"],
  [
    "user classes with methods",
    "class V1 { constructor(readonly a: number) {} plus(o: V1) { return new V1(this.a + o.a) } }; (new V1(1) + new V1(r.den > 2n ? 2 : 0)).a",
    "3",
  ],
  // biome-ignore lint/suspicious/noTemplateCurlyInString: the placeholder is the cell's
  ["template text", "`${r + 1}`", "4/3"],
  ["complex", "(z * z).minus(complex(-3, 4)).equals(0)", "true"],
  ["real and complex", "(x + z).re", "4"],
  ["parentheses and comments between", "r /* one */ + // two\n 1", "4/3"],
  [
    "points of a torus stay exact",
    "const [ω1, ω2] = lattice({ tau: 2*i }).periods; (3/7*ω1 + ω2/2 - ω1).name",
    "(−8ω1 + 7ω2)/14",
  ],
  ["points of a torus know their order", "lattice({ tau: i }).periods.map((p) => (p / 3 + p).order).join()", "3,3"],
  ["a quotient by a point of a torus", "const per1 = lattice({ tau: 2*i }).periods; (1 / per1[0]).overlaps(1)", "true"],
  ["roots", "(real(2) ** 0.5) ** 2 < 2.1", "true"],
  ["plain numbers stay as they are", "0.1 + 0.2", "0.30000000000000004"],
  ["plain quotients stay as they are", "const q1 = 1 / 3; typeof q1", "number"],
];

const REFUSED: readonly (readonly [code: string, message: string, column: number])[] = [
  ["P * w", "a point has no product with a real number. A point has whole multiples, 3 * P.", 3],
  ["P * 0.5", "a point has no product with a number. A point has whole multiples, 3 * P.", 3],
  ["1/3 * P", "a number has no product with a point. A point has whole multiples", 5],
  ["P / 2", "A part of it is a question about the torus", 3],
  ["P * P", "a point has no product with a point. Points are added: P + Q.", 3],
  ["P + 1", "a point has no sum with a number. The other side must be a point of the same curve.", 3],
  ["1 + (2 * (P * z)) - w", "a point has no product with a complex number.", 13],
  ["const u1 = [x].at(0); u1 + 1", "the value may be absent", 26],
  ["((v: unknown) => v + r)(1)", "a value of unknown type has no sum with a rational number.", 20],
  ["x < z", "have no order. Compare real or imaginary parts", 3],
  ["x == w", "== asks whether two values are the same object", 3],
  ["r !== x", "!== asks whether two values are the same object", 3],
  ["switch (r) { default: }", "switch compares with ===", 9],
  ["[r].includes(r)", "includes compares with ===", 5],
  ["if (x) {}", "a real number counts as true whatever its value", 5],
  ["!P", "a point counts as true", 2],
  ["x && 1", "a real number counts as true", 1],
  ["x % 2", "% has no meaning for a real number", 3],
  ["x ^ 2", "^ has no meaning for a real number. A power is written **.", 3],
  ["+x", "+ has no meaning for a real number", 1],
  ["~x", "~ has no meaning for a real number", 1],
  ["let x1 = x; x1++", "++ has no meaning for a real number. Write += 1.", 13],
  ["E + E", "a curve has no sum with a curve.", 3],
  ["const s2: string = r * 2", "Type 'Rational' is not assignable to type 'string'", 7],
];

describe("values", () => {
  it.each(VALUES)("%s", async (_title, code, expected) => {
    const at = code.lastIndexOf("; ");
    const [before, last] = at < 0 ? ["", code] : [code.slice(0, at + 2), code.slice(at + 2)];
    expect(await notebook.value(`${before}String(${last})`)).toBe(JSON.stringify(expected));
  });
});

describe("what is refused, at the user's operator", () => {
  it.each(REFUSED)("%s", async (code, message, column) => {
    const trace = await notebook.traceback(code);
    expect(trace).toContain(message);
    expect(trace).toContain(`line 1, column ${column}\n`);
  });

  it("undefined and null may be compared with", async () => {
    expect(await notebook.value("((maybe?: Real) => [maybe === undefined, maybe != null, maybe ? 1 : 0])(x)")).toBe(
      "[false, true, 1]",
    );
  });

  it("code that is not rewritten is told to use methods — oracle: Symbol.toPrimitive of every value", async () => {
    expect(await notebook.error("new Function('a', 'return a + 1')(x)")).toContain("use its methods");
  });
});
