// What a TeX command stands for, as a character and by its part in a formula.

/** How an atom stands among its neighbours: relations and operators between two others have space around them. */
export type Role = "letter" | "digit" | "operator" | "relation" | "open" | "close" | "mark" | "name" | "space";

export interface Sign {
  readonly text: string;
  readonly role: Role;
}

const GREEK =
  "alpha α beta β gamma γ delta δ epsilon ε varepsilon ε zeta ζ eta η theta θ vartheta ϑ kappa κ lambda λ mu μ nu ν xi ξ pi π rho ρ sigma σ tau τ phi φ varphi φ chi χ psi ψ omega ω Gamma Γ Delta Δ Theta Θ Lambda Λ Xi Ξ Pi Π Sigma Σ Phi Φ Psi Ψ Omega Ω wp ℘ ell ℓ infty ∞ partial ∂ nabla ∇ emptyset ∅ forall ∀ exists ∃ ldots ... dots ... cdots ⋯ hbar ℏ";
const RELATIONS =
  "le ≤ leq ≤ ge ≥ geq ≥ ne ≠ neq ≠ approx ≈ equiv ≡ cong ≅ sim ∼ simeq ≃ in ∈ notin ∉ subset ⊂ subseteq ⊆ supset ⊃ mid | to → rightarrow → mapsto ↦ iff ⇔ implies ⇒ bmod mod";
const OPERATORS = "pm ± mp ∓ times × cdot · oplus ⊕ otimes ⊗ circ ∘ cup ∪ cap ∩ wedge ∧ setminus ∖ backslash \\";
const NAMES =
  "sin cos tan cot sec csc sinh cosh tanh arcsin arccos arctan exp ln log lim max min gcd det deg arg dim ker";

/** The commands that are one sign; others have a shape of their own, or are unknown. */
export const SIGNS: ReadonlyMap<string, Sign> = new Map<string, Sign>([
  ...pairs(GREEK, "letter"),
  ...pairs(RELATIONS, "relation"),
  ...pairs(OPERATORS, "operator"),
  ...NAMES.split(" ").map((name): [string, Sign] => [name, { text: name, role: "name" }]),
  ...pairs("sum Σ prod ∏ int ∫", "name"),
  ["langle", { text: "⟨", role: "open" }],
  ["rangle", { text: "⟩", role: "close" }],
  ["lvert", { text: "|", role: "open" }],
  ["rvert", { text: "|", role: "close" }],
  ["{", { text: "{", role: "open" }],
  ["}", { text: "}", role: "close" }],
  ["#", { text: "#", role: "mark" }],
  ["%", { text: "%", role: "mark" }],
  ["&", { text: "&", role: "mark" }],
  ["$", { text: "$", role: "mark" }],
  ["_", { text: "_", role: "mark" }],
  [",", { text: "\u2009", role: "space" }],
  [":", { text: "\u2009", role: "space" }],
  [";", { text: " ", role: "space" }],
  [" ", { text: " ", role: "space" }],
  ["!", { text: "", role: "space" }],
  ["quad", { text: "  ", role: "space" }],
  ["qquad", { text: "    ", role: "space" }],
  ["displaystyle", { text: "", role: "space" }],
  ["textstyle", { text: "", role: "space" }],
  ["scriptstyle", { text: "", role: "space" }],
]);

/** A character of a formula that is no command. */
export function signOf(character: string): Sign | undefined {
  if (/\d|\./.test(character)) return { text: character, role: "digit" };
  if (/\p{L}|∞/u.test(character)) return { text: character, role: "letter" };
  if (character === "'") return { text: "′", role: "mark" };
  if (/[-−]/.test(character)) return { text: "−", role: "operator" };
  if (/[+*±×·/]/.test(character)) return { text: character, role: "operator" };
  if (/[=<>≤≥≠≈→∈]/.test(character)) return { text: character, role: "relation" };
  if (/[([]/.test(character)) return { text: character, role: "open" };
  if (/[)\]]/.test(character)) return { text: character, role: "close" };
  if (/[,;:!?|#′"]/.test(character)) return { text: character, role: "mark" };
  if (character === "~") return { text: " ", role: "space" };
  return undefined;
}

function pairs(words: string, role: Role): [string, Sign][] {
  const list = words.split(" ");
  return list.flatMap((word, k): [string, Sign][] => (k % 2 === 0 ? [[word, { text: list[k + 1] ?? "", role }]] : []));
}
