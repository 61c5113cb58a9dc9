// Letters by their TeX names: `\omega` before the cursor offers ω. Only letters that TypeScript takes in names.

const GREEK =
  "alpha α beta β gamma γ delta δ epsilon ϵ varepsilon ε zeta ζ eta η theta θ vartheta ϑ iota ι kappa κ lambda λ mu μ nu ν " +
  "xi ξ omicron ο pi π varpi ϖ rho ρ varrho ϱ sigma σ varsigma ς tau τ upsilon υ phi ϕ varphi φ chi χ psi ψ omega ω " +
  "Gamma Γ Delta Δ Theta Θ Lambda Λ Xi Ξ Pi Π Sigma Σ Upsilon Υ Phi Φ Psi Ψ Omega Ω";

const OTHERS =
  "wp ℘ ell ℓ hbar ℏ Re ℜ Im ℑ aleph ℵ partial ∂ nabla ∇ mathfrak{p} 𝔭 mathfrak{a} 𝔞 mathfrak{b} 𝔟 mathbb{C} ℂ mathbb{H} ℍ " +
  "mathbb{N} ℕ mathbb{P} ℙ mathbb{Q} ℚ mathbb{R} ℝ mathbb{Z} ℤ";

/** Pairs of a name and its letter. */
const LETTERS: ReadonlyMap<string, string> = new Map(
  pairs(`${GREEK} ${OTHERS}`).filter(([, letter]) => inNames(letter)),
);

function pairs(text: string): [string, string][] {
  const words = text.split(" ");
  return words.flatMap((name, at) => (at % 2 === 0 ? [[name, words[at + 1] as string] as [string, string]] : []));
}

function inNames(letter: string): boolean {
  return /^\p{ID_Start}$/u.test(letter);
}

export interface LetterMatches {
  /** Where the backslash stands. */
  readonly start: number;
  readonly letters: readonly string[];
}

/** The letters whose TeX names begin with what stands before the cursor; the exact name first. */
export function lettersBefore(code: string, offset: number): LetterMatches | undefined {
  const typed = /\\([A-Za-z]+\{?[A-Za-z]?\}?)$/.exec(code.slice(0, offset));
  if (!typed) return undefined;
  const name = typed[1] as string;
  const fitting = [...LETTERS].filter(([full]) => full.startsWith(name)).sort(([a], [b]) => a.length - b.length);
  return { start: offset - typed[0].length, letters: fitting.map(([, letter]) => letter) };
}
