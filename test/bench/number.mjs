// Real and complex enclosures against mpmath (with gmpy2) and Arb, side by side. Yardsticks that are not installed are left out.
//   node --single-threaded test/bench/number.mjs [digits,digits,...] [seconds a measurement]
// (single-threaded, so that the processor time is that of the calculation and not of the collector's helpers beside it)
// Constants (π, logarithms of primes, ...) are warm on all sides: each keeps its own between calls.
// Same inputs and the same number of bits on all sides; every time is processor time, the best of many rounds after a warm-up.
import { execFileSync, spawnSync } from "node:child_process";
import { mkdtempSync } from "node:fs";
import { cpus, tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";

const here = fileURLToPath(new URL("./number/", import.meta.url));
const ball = await import("../../dist/lib/number/ball.js");
const disc = await import("../../dist/lib/number/disc.js");
const { Rational } = await import("../../dist/lib/number/rational.js");
const { computePi } = await import("../../dist/lib/number/fixed/constants.js");

const digitList = (process.argv[2] ?? "16,50,200,1000,5000,10000").split(",").map(Number);
const budget = Number(process.argv[3] ?? 0.1);

const operations = {
  mul: ({ x, y, prec }) => ball.mul(x, y, prec),
  "bare mul": ({ x, y, shift }) => (x.man * y.man) >> shift,
  div: ({ x, y, prec }) => ball.div(x, y, prec),
  sqrt: ({ x, prec }) => ball.sqrt(x, prec),
  "complex mul": ({ z, w, prec }) => disc.mul(z, w, prec),
  exp: ({ x, prec }) => ball.exp(x, prec),
  "complex exp": ({ z, prec }) => disc.exp(z, prec),
  "sin+cos": ({ x, prec }) => ball.sinCos(x, prec),
  ln: ({ x, prec }) => ball.ln(x, prec),
  agm: ({ x, y, prec }) => ball.agm(x, y, prec),
  "complex agm": ({ z, w, prec }) => disc.agm(z, w, prec),
  pi: ({ prec }) => computePi(prec),
};

function inputs(digits) {
  const prec = Math.floor(digits * 3.3219280948873626) + 1;
  const x = ball.fromRational(Rational.of(22n, 27n), prec);
  const y = ball.fromRational(Rational.of(7n, 9n), prec);
  const v = ball.fromRational(Rational.of(5n, 11n), prec);
  return { prec, shift: BigInt(prec), x, y, z: disc.fromBalls(x, y), w: disc.fromBalls(y, v) };
}

let sink;
function measure(f, input) {
  sink = f(input);
  let count = 1;
  let spent = 0;
  let best = Infinity;
  while (spent < budget || best === Infinity) {
    const start = process.cpuUsage().user;
    for (let k = 0; k < count; k++) sink = f(input);
    const took = (process.cpuUsage().user - start) / 1000;
    spent += took / 1000;
    // The clock of the processor ticks coarsely.
    if (took > 2) best = Math.min(best, took / count);
    if (took < (budget * 1000) / 20) count *= 2;
  }
  return best * 1e6;
}

function ours(digits) {
  const input = inputs(digits);
  return new Map(Object.entries(operations).map(([name, f]) => [name, measure(f, input)]));
}

function parsed(text) {
  return new Map(
    text
      .trim()
      .split("\n")
      .map((line) => line.split("\t"))
      .map(([, name, ns]) => [name, Number(ns)]),
  );
}

function mpmath(digits) {
  const run = spawnSync("/usr/bin/python3", [join(here, "yardstick.py"), String(digits), String(budget)], {
    encoding: "utf8",
  });
  return run.status === 0 ? parsed(run.stdout) : new Map();
}

function compiledArb() {
  const program = join(mkdtempSync(join(tmpdir(), "yardstick-")), "arb");
  const built = spawnSync("cc", ["-O2", "-o", program, join(here, "yardstick.c"), "-lflint-arb", "-lflint", "-lgmp"], {
    encoding: "utf8",
  });
  return built.status === 0 ? program : undefined;
}

const program = compiledArb();
const arb = (digits) =>
  program ? parsed(execFileSync(program, [String(digits), String(budget)], { encoding: "utf8" })) : new Map();

// More where a call takes long, so that the best of them does not hang on a busy moment.
const rounds = (digits) => (digits >= 5000 ? 8 : 4);

function keepLeast(kept, fresh) {
  for (const [name, ns] of fresh) kept.set(name, Math.min(ns, kept.get(name) ?? Infinity));
}

const time = (ns) =>
  ns === undefined
    ? "-"
    : ns < 1e4
      ? `${ns.toFixed(0)} ns`
      : ns < 1e7
        ? `${(ns / 1e3).toFixed(1)} µs`
        : `${(ns / 1e6).toFixed(1)} ms`;
const ratio = (a, b) => (b === undefined ? "-" : (a / b).toFixed(2));

console.log(`${cpus()[0].model}, Node ${process.version}\n`);
console.log("| digits | operation | here | mpmath | ratio | Arb | ratio |\n|---:|---|---:|---:|---:|---:|---:|");
const growth = new Map();
for (const digits of digitList) {
  // The three take turns, so that a busy moment of the machine does not fall on one of them alone.
  const [mine, theirs, ball_] = [new Map(), new Map(), new Map()];
  for (let round = 0; round < rounds(digits); round++) {
    keepLeast(mine, ours(digits));
    keepLeast(theirs, mpmath(digits));
    keepLeast(ball_, arb(digits));
  }
  const bare = mine.get("bare mul");
  for (const [name, ns] of mine) {
    const [a, b] = [theirs.get(name), ball_.get(name)];
    console.log(`| ${digits} | ${name} | ${time(ns)} | ${time(a)} | ${ratio(ns, a)} | ${time(b)} | ${ratio(ns, b)} |`);
    growth.set(`${name} ${digits}`, ns);
  }
  console.log(`| ${digits} | enclosure over bare product |  |  | ${ratio(mine.get("mul"), bare)} |  |  |`);
}
if (digitList.includes(1000) && digitList.includes(10000)) {
  const slope = (name) => Math.log10(growth.get(`${name} 10000`) / growth.get(`${name} 1000`)).toFixed(2);
  console.log(
    `\nGrowth from 1000 to 10,000 digits as a power of the digits: ${Object.keys(operations)
      .map((n) => `${n} ${slope(n)}`)
      .join(", ")}`,
  );
}
if (sink === null) console.log(sink);
