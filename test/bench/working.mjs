// What it costs to be able to answer working(x) where nobody asks. A result of a curve or a lattice gets one note, an entry of a weak map;
// a number has no note, since its record is what its digits are computed from. So the cost is counted: notes a result, times the cost of
// a note (with the garbage it makes), over the time of the result. The limit is 2 %. All times are CPU times, best of several.
//   node test/bench/working.mjs
import { cpSync, rmSync, writeFileSync } from "node:fs";
import { cpus } from "node:os";
import { fileURLToPath } from "node:url";

const built = fileURLToPath(new URL("../../dist/lib", import.meta.url));
const copy = fileURLToPath(new URL("../../dist/counting", import.meta.url));
cpSync(built, copy, { recursive: true });
writeFileSync(
  `${copy}/proof/behind.js`,
  "export const count = { notes: 0 };\nexport function remember(result) {\n  count.notes++;\n  return result;\n}\nexport const recall = () => undefined;\n",
);
const counting = await import(`${copy}/index.js`);
const { count } = await import(`${copy}/proof/behind.js`);
rmSync(copy, { recursive: true });
const library = await import(`${built}/index.js`);
const { remember } = await import(`${built}/proof/behind.js`);

/** Jobs of one library: each makes its results anew. */
function jobs({ curve, complex, recognise, real, provedDigits }) {
  provedDigits(50);
  const E = curve`y^2 + y = x^3 - x`;
  const T = curve`y^2 + x y + y = x^3 - x^2 - 3x + 3`;
  const L = E.lattice();
  const z = complex("0.41", "0.27");
  const P = E.point(2, -3);
  const x = real(2).sqrt().times(real(3).sqrt()).times(real(6).sqrt()).div(18);
  return {
    "E.lattice() of a new curve": () => curve`y^2 + y = x^3 - x`.lattice().periods.map(String),
    "E.torsion()": () => T.torsion().order,
    "E.minimal()": () => T.minimal().curve,
    "E.logarithm(P)": () => E.logarithm(P),
    "E.exponential(z)": () => E.exponential(z).x,
    "L.wp(z)": () => L.wp(z),
    "L.reduced": () => L.reduced.tau,
    "L.complexMultiplication()": () => L.complexMultiplication().outcome,
    "E.divisionPolynomial(5)": () => E.divisionPolynomial(5),
    "recognise(x)": () => recognise(x),
    "1,000 sums and products": () => {
      let y = x;
      for (let k = 0; k < 500; k++) y = y.times(x).plus(x);
      return y;
    },
  };
}

/** CPU time of one call in µs, best of a few measurements of about 0.1 s: the clock of a process may count in steps of 10 ms. */
function best(job) {
  const run = (times) => {
    const start = process.cpuUsage();
    for (let k = 0; k < times; k++) job();
    const { user, system } = process.cpuUsage(start);
    return user + system;
  };
  let times = 16;
  while (run(times) < 100_000) times *= 2;
  return Math.min(...Array.from({ length: 7 }, () => run(times) / times));
}

const made = { curve: {} };
let kept;
const withNote = best(() => {
  kept = remember({ made }, made);
});
const withoutNote = best(() => {
  kept = { made };
});
const note = Math.max(0, withNote - withoutNote);
console.log(`${cpus()[0].model}, Node ${process.version}; a note costs ${note.toFixed(3)} µs${kept ? "" : "."}\n`);
console.log("| result, 50 digits | µs | notes | share of the notes |\n|---|---:|---:|---:|");
const plain = jobs(library);
let worst = 0;
for (const [name, job] of Object.entries(jobs(counting))) {
  job();
  const before = count.notes;
  job();
  const notes = count.notes - before;
  const time = best(plain[name]);
  const share = (100 * notes * note) / time;
  worst = Math.max(worst, share);
  console.log(`| ${name} | ${time.toFixed(2)} | ${notes} | ${share.toFixed(2)} % |`);
}
console.log(`\nlargest share ${worst.toFixed(2)} %`);
