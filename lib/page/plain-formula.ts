// Running text with $formulas$ as plain text: the few TeX commands that our own sentences use, in Unicode.

const COMMANDS: Readonly<Record<string, string>> = {
  sum: "Σ",
  pm: "±",
  mid: "|",
  in: "∈",
  theta: "θ",
  lambda: "λ",
  zeta: "ζ",
  sigma: "σ",
  eta: "η",
  alpha: "α",
  Gamma: "Γ",
  sin: "sin ",
  cos: "cos ",
  times: "×",
  to: "→",
  ne: "≠",
  varphi: "φ",
  omega: "ω",
  Delta: "Δ",
  Lambda: "Λ",
  tau: "τ",
  wp: "℘",
  psi: "ψ",
  pi: "π",
  infty: "∞",
  le: "≤",
  ge: "≥",
  cdot: "·",
  quad: " ",
};

/** The text without dollar signs, its formulas readable: "$\\#E(\\mathbb{F}_p)$" is "#E(F_p)". */
export function plainFormulas(text: string): string {
  return text.replace(/\$([^$]*)\$/g, (_, formula: string) => plainFormula(formula));
}

function plainFormula(formula: string): string {
  return formula
    .replace(/\\mathbb\{(\w)\}/g, "$1")
    .replace(/\\(?:frac|tfrac)\{?(\w+)\}?\{?(\w+)\}?/g, "$1/$2")
    .replace(/\\sqrt\{([^{}]*)\}/g, "√($1)")
    .replace(/\\operatorname\{(\w+)\}/g, "$1")
    .replace(/\\([A-Za-z]+)(?: (?=[\p{L}\p{N}\\]))?/gu, (_, name: string) => COMMANDS[name] ?? name)
    .replace(/\\[,;! ]\s*/g, " ")
    .replace(/\\([#{}])/g, "$1")
    .replace(/([\p{L}])_\{?(\d+)\}?/gu, "$1$2");
}
