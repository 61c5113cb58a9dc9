// Periods, ℘ with ℘′ and ζ, and the elliptic logarithm beside mpmath (periods by roots and agm, the functions by theta series with
// derivatives, the logarithm by Carlson's RF), the same digits on both sides, rigour included on ours.
//     npm run build && node test/bench/lattice.mjs [digits ...]
import { spawnSync } from "node:child_process";
import { cpus } from "node:os";
import { realPeriods } from "../../dist/lib/lattice/agm-periods.js";
import { discriminant, latticeOfInvariants } from "../../dist/lib/lattice/build.js";
import { cubicRoots } from "../../dist/lib/lattice/cubic.js";
import { realLogarithm } from "../../dist/lib/lattice/real-logarithm.js";
import { weierstrassValues } from "../../dist/lib/lattice/values.js";
import * as ball from "../../dist/lib/number/ball.js";
import * as disc from "../../dist/lib/number/disc.js";
import { Rational } from "../../dist/lib/number/rational.js";

const digits = process.argv.slice(2).map(Number);
const list = digits.length > 0 ? digits : [50, 200, 1000];
const [g2, g3] = [Rational.of(4), Rational.of(-1)];

/** Processor time of this process in microseconds: other load on the machine counts little. */
function clock() {
  const { user, system } = process.cpuUsage();
  return user + system;
}

/** Mean and deviation of the processor time of f in microseconds, in ten groups after a warm-up. */
function timed(f, budget = 1500) {
  const start = clock();
  let runs = 0;
  while (clock() - start < budget * 500 || runs < 3) {
    f();
    runs++;
  }
  const size = Math.max(1, Math.round(runs / 5));
  const groups = Array.from({ length: 10 }, () => {
    const t = clock();
    for (let k = 0; k < size; k++) f();
    return (clock() - t) / size;
  });
  const mean = groups.reduce((a, b) => a + b) / groups.length;
  return { mean, deviation: Math.sqrt(groups.reduce((s, x) => s + (x - mean) ** 2, 0) / groups.length) };
}

function ours(n) {
  const prec = Math.ceil(n * 3.33) + 8;
  const L = latticeOfInvariants(g2, g3);
  const z = disc.fromRational(Rational.parse("0.41"), prec + 20, Rational.parse("0.27"));
  const period = () => {
    const roots = cubicRoots(
      disc.fromRational(g2, prec),
      disc.fromRational(g3, prec),
      discriminant(g2, g3, prec),
      prec,
    );
    return realPeriods(roots, 2, prec);
  };
  return {
    periods: timed(period),
    functions: timed(() => weierstrassValues(L, z, prec, ["wp", "prime", "zeta"])),
    logarithm: timed(() => realLogarithm(L, ball.fromInt(2), ball.fromInt(5), prec)),
  };
}

const PYTHON = `
import sys, time, math
from mpmath import mp, mpf, mpc, polyroots, agm, sqrt, pi, jtheta, elliprf, exp
def timed(f, budget=0.4):
    t=time.process_time(); runs=0
    while time.process_time()-t<budget/2 or runs<3: f(); runs+=1
    size=max(1,round(runs/5)); groups=[]
    for _ in range(10):
        t=time.process_time()
        for _ in range(size): f()
        groups.append((time.process_time()-t)*1e6/size)
    m=sum(groups)/10
    return m, math.sqrt(sum((x-m)**2 for x in groups)/10)
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
    print(*[x for f in (periods,functions,logarithm) for x in timed(f)])
`;

const python = spawnSync("python3", ["-c", PYTHON, ...list.map(String)], { encoding: "utf8" });
const theirs =
  python.status === 0
    ? python.stdout
        .trim()
        .split("\n")
        .map((line) => line.split(" ").map(Number))
    : [];
if (theirs.length === 0) console.log("python3 with mpmath is not here: our side only.");

console.log(
  `Node ${process.version}, ${cpus()[0]?.model ?? "unknown processor"}; processor time in microseconds, mean ± deviation of ten groups\n`,
);
console.log("| digits | job | mpmath | halfperiod | ratio |");
console.log("|---|---|---|---|---|");
list.forEach((n, row) => {
  const times = ours(n);
  Object.entries(times).forEach(([job, { mean, deviation }], k) => {
    const other = theirs[row]?.slice(2 * k, 2 * k + 2);
    const left = other ? `${other[0].toFixed(0)} ± ${other[1].toFixed(0)}` : "";
    const ratio = other ? (mean / other[0]).toFixed(3) : "";
    console.log(`| ${n} | ${job} | ${left} | ${mean.toFixed(0)} ± ${deviation.toFixed(0)} | ${ratio} |`);
  });
});
