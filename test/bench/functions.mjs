// Carlson's and Legendre's integrals, Jacobi's functions, theta and modular functions beside mpmath and Arb: the same digits on all sides,
// rigour included on ours and on Arb's. Processor time in microseconds, the least of some interleaved rounds; nothing is kept between calls,
// but for Jacobi's functions the quarter periods of the modulus are ("warm"), which has a row of its own without.
//     npm run build && node test/bench/functions.mjs [digits ...]
// mpmath is looked for with gmpy2 in Debian's python3, Arb's library (Debian: libflint-arb-dev) by the C compiler; without them a column is empty.
import { spawnSync } from "node:child_process";
import { mkdtempSync, rmSync } from "node:fs";
import { cpus, tmpdir } from "node:os";
import { fileURLToPath } from "node:url";
import { carlsonRF } from "../../dist/lib/function/carlson-first.js";
import { carlsonRG } from "../../dist/lib/function/carlson-second.js";
import { carlsonRD, carlsonRJ } from "../../dist/lib/function/carlson-third.js";
import { jacobiContext, jacobiValues } from "../../dist/lib/function/jacobi-values.js";
import { completeE, completeK } from "../../dist/lib/function/legendre-complete.js";
import { incompleteE, incompleteF, incompletePi } from "../../dist/lib/function/legendre-incomplete.js";
import { dedekindEta, eisensteinE, jInvariant, modularLambda } from "../../dist/lib/function/modular-forms.js";
import { thetaJet } from "../../dist/lib/function/theta-values.js";
import * as disc from "../../dist/lib/number/disc.js";
import { Rational } from "../../dist/lib/number/rational.js";

const ROUNDS = 3;
const SECONDS = 0.25;
const wanted = process.argv.slice(2).map(Number);
const list = wanted.length > 0 ? wanted : [50, 200, 1000];
const here = (name) => fileURLToPath(new URL(`functions/${name}`, import.meta.url));

function jobs(digits) {
  const prec = Math.ceil(digits * 3.3219281) + 8;
  const number = (re, im = "0") => disc.fromRational(Rational.parse(re), prec + 30, Rational.parse(im));
  const [a, b, c, d] = ["11/10", "23/10", "37/10", "5"].map((x) => number(x));
  const z = [number("11/10", "37/10"), number("23/10", "-11/10"), number("37/10", "23/10")];
  const k = { m: number("3/10"), m1: number("7/10") };
  const n = { n: number("1/10"), n1: number("9/10") };
  const [phi, w, tau] = [number("7/10"), number("0.41", "0.27"), number("1/7", "9/10")];
  const context = jacobiContext(k, prec + 8);
  const all = ["sn", "cn", "dn"];
  return {
    "RF real": () => carlsonRF(a, b, c, prec),
    "RF complex": () => carlsonRF(...z, prec),
    "RD real": () => carlsonRD(a, b, c, prec),
    "RG real": () => carlsonRG(a, b, c, prec),
    "RJ real": () => carlsonRJ(a, b, c, d, prec),
    "RJ complex": () => carlsonRJ(...z, d, prec),
    "K(m)": () => completeK(k, prec),
    "E(m)": () => completeE(k, prec),
    "F(phi|m)": () => incompleteF(phi, k, prec),
    "E(phi|m)": () => incompleteE(phi, k, prec),
    "Pi(n; phi|m)": () => incompletePi(n, phi, k, prec),
    "sn, cn, dn real u": () => jacobiValues(all, phi, k, prec),
    "sn, cn, dn complex u": () => jacobiValues(all, w, k, prec),
    "sn, cn, dn complex u, warm": () => jacobiValues(all, w, k, prec, () => context),
    "theta3 complex v": () => thetaJet(3, w, tau, 0, prec),
    "eta(tau)": () => dedekindEta(tau, prec),
    "j(tau)": () => jInvariant(tau, prec),
    "lambda(tau)": () => modularLambda(tau, prec),
    "E4(tau)": () => eisensteinE(4, tau, prec),
  };
}

function clock() {
  const { user, system } = process.cpuUsage();
  return user + system;
}

/** Microseconds a call. */
function timed(f) {
  f();
  const start = clock();
  let runs = 0;
  while (runs < 2 || clock() - start < SECONDS * 1e6) {
    f();
    runs++;
  }
  return (clock() - start) / runs;
}

const ours = (digits) => Object.entries(jobs(digits)).map(([name, f]) => [name, timed(f)]);

/** The lines "name<TAB>microseconds" of another program; none if it cannot run. */
function theirs(command, args) {
  const { status, stdout } = spawnSync(command, args, { encoding: "utf8" });
  if (status !== 0) return [];
  return stdout
    .trim()
    .split("\n")
    .map((line) => line.split("\t"))
    .map(([name, time]) => [name, Number(time)]);
}

const folder = mkdtempSync(`${tmpdir()}/functions-`);
const built = ["flint-arb", "arb", "flint"].some(
  (name) =>
    spawnSync("cc", ["-O2", here("jobs.c"), "-o", `${folder}/jobs`, `-l${name}`, "-lflint", "-lm"]).status === 0,
);
const python = ["/usr/bin/python3", "python3"].find((p) => spawnSync(p, ["-c", "import mpmath, gmpy2"]).status === 0);

const sides = (digits) => ({
  halfperiod: ours(digits),
  mpmath: python ? theirs(python, [here("jobs.py"), String(digits), String(SECONDS)]) : [],
  Arb: built ? theirs(`${folder}/jobs`, [String(digits), String(SECONDS)]) : [],
});

function best(digits) {
  const least = {};
  for (let round = 0; round < ROUNDS; round++) {
    for (const [side, times] of Object.entries(sides(digits))) {
      least[side] ??= new Map();
      for (const [name, time] of times) least[side].set(name, Math.min(time, least[side].get(name) ?? Infinity));
    }
  }
  return least;
}

console.log(
  `Node ${process.version}, ${cpus()[0]?.model ?? "unknown processor"}; microseconds of processor time a call\n`,
);
console.log("| digits | job | halfperiod | mpmath | ratio | Arb | ratio |");
console.log("|---|---|---|---|---|---|---|");
for (const digits of list) {
  const { halfperiod, mpmath, Arb } = best(digits);
  for (const [name, time] of halfperiod) {
    const other = name.replace(", warm", "");
    const cells = [mpmath, Arb].flatMap((side) => {
      const theirTime = side.get(other);
      return theirTime === undefined ? ["", ""] : [theirTime.toFixed(0), (time / theirTime).toFixed(2)];
    });
    console.log(`| ${digits} | ${name} | ${time.toFixed(0)} | ${cells.join(" | ")} |`);
  }
}
rmSync(folder, { recursive: true });
