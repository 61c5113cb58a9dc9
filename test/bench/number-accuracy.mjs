// The accuracy table: how wide results are, against the best that a radius of one unit in a mantissa of that length allows.
//   node test/bench/number-accuracy.mjs
// Exact or sharp arguments; the ratio is radius/(|result|·2^-prec), the worst over the range. 1 to 2 is the best possible.
const ball = await import("../../dist/lib/number/ball.js");
const disc = await import("../../dist/lib/number/disc.js");
const { Rational } = await import("../../dist/lib/number/rational.js");

const at = (num, den, prec) => ball.fromRational(Rational.of(num, den), prec + 40);
const REAL = {
  add: ["1 + x, 0 < x < 10", (x, p) => ball.add(ball.one, x, p)],
  mul: ["x·x, 0 < x < 10", (x, p) => ball.mul(x, x, p)],
  div: ["1/x, 0 < x < 10", (x, p) => ball.inv(x, p)],
  sqrt: ["0 < x < 10", ball.sqrt],
  nthRoot: ["cube root, 0 < x < 10", (x, p) => ball.nthRoot(x, 3, p)],
  exp: ["0 < x < 10", ball.exp],
  ln: ["0 < x < 10", ball.ln],
  sin: ["0 < x < 10, away from zeros by 1/20", ball.sin],
  cos: ["0 < x < 10, away from zeros by 1/20", ball.cos],
  tan: ["0 < x < 10", ball.tan],
  atan: ["0 < x < 10", ball.atan],
  sinh: ["0 < x < 10", ball.sinh],
  tanh: ["0 < x < 10", ball.tanh],
  agm: ["agm(1, x), 0 < x < 10", (x, p) => ball.agm(ball.one, x, p)],
};
const COMPLEX = {
  "complex mul": ["z·z, |z| < 7", (z, p) => disc.sqr(z, p)],
  "complex div": ["1/z, |z| < 7", (z, p) => disc.inv(z, p)],
  "complex sqrt": ["|z| < 7", (z, p) => disc.sqrt(z, p)],
  "complex exp": ["|z| < 7", (z, p) => disc.exp(z, p)],
  "complex ln": ["|z| < 7", (z, p) => disc.ln(z, p)],
  "complex sin": ["|z| < 7", (z, p) => disc.sinCos(z, p).sin],
  "complex agm": ["agm(1, z), |z| < 7", (z, p) => disc.agm(disc.one, z, p)],
};

function ratio(size, radius, prec) {
  // Both as balls of any exponent: their quotient is a modest number.
  return ball.toDouble(ball.ldexp(ball.div(radius, size, 40), prec));
}

const POINTS = 40;
const rows = [];
for (const digits of [16, 50, 1000, 10000]) {
  const prec = Math.ceil(digits * 3.3219280948873626);
  const count = digits > 1000 ? 2 : POINTS;
  for (const [name, [range, f]] of Object.entries(REAL)) {
    let worst = 0;
    for (let k = 1; k <= count; k++) {
      const y = f(at(BigInt(2 * k * Math.floor(POINTS / count)) - 1n, 8n, prec), prec);
      if (Math.abs(ball.toDouble(y)) < 1 / 20 && (name === "sin" || name === "cos")) continue;
      worst = Math.max(worst, ratio(ball.abs(y), ball.radius(y), prec));
    }
    rows.push([name, range, digits, worst]);
  }
  for (const [name, [range, f]] of Object.entries(COMPLEX)) {
    let worst = 0;
    for (let k = 1; k <= count; k++) {
      const step = BigInt(k * Math.floor(POINTS / count));
      const z = disc.fromBalls(at(step - 17n, 8n, prec), at(29n - step, 8n, prec));
      const y = f(z, prec);
      worst = Math.max(worst, ratio(disc.abs(y, 40), ball.radius({ man: 0n, exp: y.exp, rad: y.rad }), prec));
    }
    rows.push([name, range, digits, worst]);
  }
}
console.log("| function | range | digits | worst radius in units of the last bit asked |\n|---|---|---:|---:|");
for (const [name, range, digits, worst] of rows.sort((a, b) => a[0].localeCompare(b[0]) || a[2] - b[2])) {
  console.log(`| ${name} | ${range} | ${digits} | ${worst.toFixed(1)} |`);
}
