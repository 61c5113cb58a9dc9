// Periods, ℘ with ℘′ and ζ, and the elliptic logarithm beside mpmath (periods by roots and agm, the functions by theta series with
// derivatives, the logarithm by Carlson's RF) and beside Arb (roots and agm; ℘ alone), the same digits on all sides, rigour included on ours.
//     npm run build && node --single-threaded test/bench/lattice.mjs [digits ...]
import { spawnSync } from "node:child_process";
import { mkdtempSync, rmSync } from "node:fs";
import { cpus, tmpdir } from "node:os";
import { join } from "node:path";
import { complex, lattice, provedDigits } from "../../dist/lib/index.js";
import { latticeOfInvariants } from "../../dist/lib/lattice/build.js";
import { fixedPeriods } from "../../dist/lib/lattice/fixed-periods.js";
import { realLogarithm } from "../../dist/lib/lattice/real-logarithm.js";
import { weierstrassValues } from "../../dist/lib/lattice/values.js";
import * as ball from "../../dist/lib/number/ball.js";
import { workingPrecision } from "../../dist/lib/number/context.js";
import * as disc from "../../dist/lib/number/disc.js";
import { Rational } from "../../dist/lib/number/rational.js";

const digits = process.argv.slice(2).map(Number);
const list = digits.length > 0 ? digits : [50, 200, 1000, 5000];
const [g2, g3] = [Rational.of(4), Rational.of(-1)];

/** Processor time of this process in microseconds: other load on the machine counts little. */
function clock() {
  const { user, system } = process.cpuUsage();
  return user + system;
}

/** Best processor time of f in microseconds, of fifteen groups after a warm-up. */
function timed(f, budget = 400_000) {
  const start = clock();
  let runs = 0;
  while (clock() - start < budget || runs < 2) {
    f();
    runs++;
  }
  const size = Math.max(1, runs >> 3);
  let best = Infinity;
  for (let k = 0; k < 15; k++) {
    const t = clock();
    for (let l = 0; l < size; l++) f();
    best = Math.min(best, (clock() - t) / size);
  }
  return best;
}

function ours(n) {
  const prec = Math.ceil(n * 3.33) + 8;
  const L = latticeOfInvariants(g2, g3);
  const z = disc.fromRational(Rational.parse("0.41"), prec + 20, Rational.parse("0.27"));
  const period = () => fixedPeriods(ball.fromRational(g2, prec + 16), ball.fromRational(g3, prec + 16), 2, prec + 4);
  return {
    periods: timed(period),
    functions: timed(() => weierstrassValues(L, z, prec, ["wp", "prime", "zeta"])),
    logarithm: timed(() => realLogarithm(L, ball.fromInt(2), ball.fromInt(5), prec)),
  };
}

/**
 * 1,000 points of one lattice at 50 digits: evaluations in a known lattice, the same with the context made afresh, and as a cell writes them, L.wp(z) of a
 * new lattice with numbers made before.
 */
function manyPoints() {
  provedDigits(50);
  const prec = workingPrecision();
  const places = Array.from({ length: 1000 }, (_, k) => [Rational.of(k + 1, 1009), Rational.of(k + 3, 1013)]);
  const points = places.map(([x, y]) => disc.fromRational(x, prec + 20, y));
  const run = (L) => {
    for (const z of points) weierstrassValues(L, z, prec, ["wp"]);
  };
  const known = latticeOfInvariants(g2, g3);
  const fresh = timed(() => run(latticeOfInvariants(g2, g3)), 1_500_000);
  const numbers = places.map(([x, y]) => complex(x, y));
  const written = timed(() => {
    const L = lattice({ invariants: [4, -1] });
    for (const z of numbers) L.wp(z);
  }, 1_500_000);
  return { known: timed(() => run(known), 1_500_000), fresh, written };
}

/** Exponents of growth from 1,000 to 10,000 digits: log10 of the ratio of the times. */
function growth() {
  const [small, large] = [ours(1000), ours(10_000)];
  return Object.keys(small).map((job) => [job, Math.log10(large[job] / small[job]), large[job]]);
}

const PYTHON = `
import sys, time
from mpmath import mp, mpc, polyroots, agm, sqrt, pi, jtheta, elliprf, exp
def timed(f, budget=0.4):
    t=time.process_time(); runs=0
    while time.process_time()-t<budget or runs<2: f(); runs+=1
    size=max(1,runs//8); best=1e9
    for _ in range(15 if runs>8 else 3):
        t=time.process_time()
        for _ in range(size): f()
        best=min(best,(time.process_time()-t)*1e6/size)
    return best
for n in map(int, sys.argv[1:]):
    mp.dps=n
    def periods():
        e=sorted([r.real for r in polyroots([4,0,-4,1],maxsteps=200,extraprec=200)],reverse=True)
        return pi/agm(sqrt(e[0]-e[2]),sqrt(e[0]-e[1])), pi/agm(sqrt(e[0]-e[2]),sqrt(e[1]-e[2]))
    w1,w2=periods()
    r1,r2=w2*1j,-w1
    q=exp(1j*pi*r2/r1).real
    z=mpc('0.41','0.27')
    t1=jtheta(1,0,q,1); t3=jtheta(1,0,q,3)
    def functions():
        v=pi*z/r1
        a=[jtheta(1,v,q,k) for k in range(4)]
        c=pi/r1; eta=-(pi**2)*t3/(3*r1*t1)
        b=[a[k]/a[0] for k in range(4)]
        return -eta/r1-c*c*(b[2]-b[1]**2), -c**3*(b[3]-3*b[2]*b[1]+2*b[1]**3), eta*z/r1+c*b[1]
    e=sorted([r.real for r in polyroots([4,0,-4,1],maxsteps=200,extraprec=200)],reverse=True)
    def logarithm(): return elliprf(2-e[0],2-e[1],2-e[2])
    print(*[timed(f) for f in (periods,functions,logarithm)], flush=True)
`;

/** Lines of numbers that a program prints for each number of digits, or nothing if it is not here. */
function lines(command, args) {
  const { status, stdout } = spawnSync(command, args, { encoding: "utf8" });
  if (status !== 0) return [];
  return stdout
    .trim()
    .split("\n")
    .map((line) => line.split(" ").map(Number));
}

/** mpmath with gmpy2 where Debian's Python has it. */
function mpmath(n) {
  const args = ["-c", PYTHON, String(n)];
  return lines("/usr/bin/python3", args)[0] ?? lines("python3", args)[0] ?? [];
}

const folder = mkdtempSync(join(tmpdir(), "lattice-"));
const program = join(folder, "yardstick");
const source = new URL("lattice-yardstick.c", import.meta.url).pathname;
const compiled = spawnSync("cc", ["-O2", source, "-o", program, "-lflint-arb", "-lflint", "-lm"]).status === 0;
if (!compiled) console.log("no C compiler or no libflint-arb-dev: no column for ball arithmetic in C.");

const FLOORS = {
  periods: { mpmath: [0.04, 0.06, 0.1, 0.1], arb: [0.5, 0.5, 0.9, 0.8] },
  functions: { mpmath: [0.08, 0.12, 0.16, 0.12], arb: [2, 1.6, 1.4, 1.3] },
  logarithm: { mpmath: [0.13, 0.1, 0.12, 0.05], arb: [] },
};

console.log(
  `Node ${process.version}, ${cpus()[0]?.model ?? "unknown processor"}; processor time in microseconds, best group\n`,
);
console.log("| digits | job | halfperiod | mpmath | ratio (floor) | Arb | ratio (floor) |");
console.log("|---|---|---|---|---|---|---|");
for (const n of list) {
  const before = compiled ? lines(program, [String(n)])[0] : [];
  const times = ours(n);
  const theirs = mpmath(n);
  const after = compiled ? lines(program, [String(n)])[0] : [];
  const at = [50, 200, 1000, 5000].indexOf(n);
  Object.entries(times).forEach(([job, time], k) => {
    const arb = before?.[k] && after?.[k] ? Math.min(before[k], after[k]) : undefined;
    const beside = (other, floor) =>
      other ? `${other.toFixed(0)} | ${(time / other).toFixed(3)}${floor ? ` (${floor})` : ""}` : " | ";
    const { mpmath: first, arb: second } = FLOORS[job];
    console.log(
      `| ${n} | ${job} | ${time.toFixed(0)} | ${beside(theirs[k], first[at])} | ${beside(arb, second[at])} |`,
    );
  });
}
const { known, fresh, written } = manyPoints();
const over = (time) => `${time.toFixed(0)} (${(time / known).toFixed(2)})`;
console.log(`\n1,000 points at 50 digits, in one known lattice: ${known.toFixed(0)}`);
console.log(`  in a new lattice: ${over(fresh)}; as L.wp(z) of a new lattice: ${over(written)}`);
console.log("\nGrowth from 1,000 to 10,000 digits, as a power of the digits (at most 1.8), and the time at 10,000:");
for (const [job, power, time] of growth()) console.log(`  ${job}: ${power.toFixed(2)}, ${(time / 1000).toFixed(1)} ms`);
rmSync(folder, { recursive: true });
