// What the record of a value's origin costs: a chain of 1,000 operations at 50 digits, as values and as bare enclosures.
//   node --single-threaded test/bench/number-chain.mjs
import { cpus } from "node:os";

const ball = await import("../../dist/lib/number/ball.js");
const { provedDigits, workingPrecision } = await import("../../dist/lib/number/context.js");
const { sqrt } = await import("../../dist/lib/number/functions.js");

provedDigits(50);
const prec = workingPrecision();
const start = sqrt(2).plus(sqrt(3));
const step = sqrt("1/2").plus(sqrt("1/3"));
const shift = sqrt("1/5").plus(sqrt("1/7"));
const LENGTH = 1000;

function values(x) {
  let z = x;
  for (let k = 0; k < LENGTH / 2; k++) z = z.times(step).plus(shift);
  return z;
}

function bare(x) {
  let z = x;
  const [a, b] = [step.ball, shift.ball];
  for (let k = 0; k < LENGTH / 2; k++) z = ball.add(ball.mul(z, a, prec), b, prec);
  return z;
}

function measure(f, x, rounds) {
  const start = process.cpuUsage().user;
  for (let k = 0; k < rounds; k++) f(x);
  return (process.cpuUsage().user - start) / rounds / LENGTH;
}

// The two take turns, so that a busy machine slows both.
const times = { values: [], bare: [] };
for (let round = 0; round < 40; round++) {
  times.values.push(measure(values, start, 40));
  times.bare.push(measure(bare, start.ball, 40));
}
const median = (list) => list.slice(5).sort((a, b) => a - b)[Math.floor((list.length - 5) / 2)];
const [v, b] = [median(times.values), median(times.bare)];
const ratio = median(times.values.map((t, k) => t / times.bare[k]));
console.log(`${cpus()[0].model}, Node ${process.version}\n`);
console.log("| chain of 1,000 operations, 50 digits | µs an operation |\n|---|---:|");
console.log(
  `| values with their origin | ${v.toFixed(3)} |\n| bare enclosures | ${b.toFixed(3)} |\n| median ratio of a round | ${ratio.toFixed(2)} |`,
);
