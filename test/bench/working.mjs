// What it costs to be able to answer working(x) where nobody asks: the library as it is, and the same with the note of what a result
// was made from left out. CPU time of processes of their own, in turns; the limit is a ratio of 1.02. The last row is the same library
// against itself: what a ratio means on this machine.
//   node test/bench/working.mjs
import { execFileSync } from "node:child_process";
import { cpSync, rmSync, writeFileSync } from "node:fs";
import { cpus } from "node:os";
import { fileURLToPath } from "node:url";

/** Jobs of one library: each makes its results anew. */
function jobs({ curve, lattice, complex, recognise, real, provedDigits }) {
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

const TIMES = 3;

/** CPU time of one call in µs, best of a few measurements of about 0.2 s: the clock of a process may count in steps of 10 ms. */
function best(job) {
  const run = (times) => {
    const start = process.cpuUsage().user;
    for (let k = 0; k < times; k++) job();
    return process.cpuUsage().user - start;
  };
  let times = 16;
  while (run(times) < 60_000) times *= 2;
  return Math.min(...Array.from({ length: TIMES }, () => run(times) / times));
}

const [, , library] = process.argv;
if (library) {
  const list = jobs(await import(`${library}/index.js`));
  const found = Object.entries(list).map(([name, job]) => [name, best(job)]);
  process.stdout.write(JSON.stringify(Object.fromEntries(found)));
} else compare();

function compare() {
  const built = fileURLToPath(new URL("../../dist/lib", import.meta.url));
  const copies = ["without-notes", "as-it-is", "again"].map((name) =>
    fileURLToPath(new URL(`../../dist/${name}`, import.meta.url)),
  );
  for (const copy of copies) cpSync(built, copy, { recursive: true });
  const nothing = "export const remember = (result) => result;\nexport const recall = () => undefined;\n";
  writeFileSync(`${copies[0]}/proof/behind.js`, nothing);
  try {
    print(copies);
  } finally {
    for (const copy of copies) rmSync(copy, { recursive: true });
  }
}

function print(copies) {
  const ROUNDS = 4;
  const measured = copies.map(() => []);
  for (let round = 0; round < ROUNDS; round++) {
    copies.forEach((copy, k) => {
      const out = execFileSync(process.execPath, [fileURLToPath(import.meta.url), copy], { encoding: "utf8" });
      measured[k].push(JSON.parse(out));
    });
  }
  const least = (k, name) => Math.min(...measured[k].map((found) => found[name]));
  console.log(`${cpus()[0].model}, Node ${process.version}; CPU time in µs, best of ${ROUNDS} processes in turns\n`);
  console.log("| 50 digits | without notes | as it is | ratio | as it is, twice |\n|---|---:|---:|---:|---:|");
  const ratios = [];
  for (const name of Object.keys(measured[0][0])) {
    const [bare, full, again] = [0, 1, 2].map((k) => least(k, name));
    ratios.push(full / bare);
    console.log(
      `| ${name} | ${bare.toFixed(2)} | ${full.toFixed(2)} | ${(full / bare).toFixed(3)} | ${(again / full).toFixed(3)} |`,
    );
  }
  ratios.sort((x, y) => x - y);
  console.log(`\nmedian ratio ${ratios[Math.floor(ratios.length / 2)].toFixed(3)}`);
}
