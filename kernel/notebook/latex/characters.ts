// Text into LaTeX for any engine: what LaTeX reserves is escaped, letters and signs beyond ASCII become commands, so that
// the file compiles with pdfTeX too.

const RESERVED: Readonly<Record<string, string>> = {
  "\\": "\\textbackslash{}",
  "{": "\\{",
  "}": "\\}",
  $: "\\$",
  "&": "\\&",
  "#": "\\#",
  "%": "\\%",
  _: "\\_",
  "^": "\\textasciicircum{}",
  "~": "\\textasciitilde{}",
};

const GREEK =
  "α alpha β beta γ gamma δ delta ε varepsilon ζ zeta η eta θ theta ι iota κ kappa λ lambda μ mu ν nu ξ xi π pi ρ rho σ sigma ς varsigma τ tau υ upsilon φ varphi ϕ phi χ chi ψ psi ω omega ϑ vartheta Γ Gamma Δ Delta Θ Theta Λ Lambda Ξ Xi Π Pi Σ Sigma Υ Upsilon Φ Phi Ψ Psi Ω Omega";
const SIGNS =
  "℘ wp ′ prime ∞ infty √ surd ∈ in ∉ notin ∋ ni ⊂ subset ⊃ supset ⊆ subseteq ⊇ supseteq ∪ cup ∩ cap ∅ varnothing ∀ forall ∃ exists ¬ neg ∧ wedge ∨ vee ≠ neq ≤ leq ≥ geq < < > > ≈ approx ≡ equiv ≅ cong ∼ sim ∝ propto ± pm ∓ mp × times ÷ div · cdot ∘ circ ⊕ oplus ⊗ otimes → to ← leftarrow ↔ leftrightarrow ↦ mapsto ⇒ Rightarrow ⇐ Leftarrow ⇔ Leftrightarrow ↪ hookrightarrow ∂ partial ∇ nabla ∫ int ∮ oint ∑ sum ∏ prod ℓ ell ℏ hbar ℜ Re ℑ Im ⟨ langle ⟩ rangle ⌊ lfloor ⌋ rfloor ⌈ lceil ⌉ rceil ∥ parallel ⊥ perp ∠ angle ★ star • bullet … ldots ⋯ cdots − -";

function pairs(list: string): [string, string][] {
  const words = list.split(" ");
  return words.flatMap((sign, index) =>
    index % 2 === 0 ? [[sign, (words[index + 1] ?? "").replace(/^(?=[a-zA-Z])/, "\\")] as [string, string]] : [],
  );
}

const SUPERSCRIPTS = "⁰¹²³⁴⁵⁶⁷⁸⁹";
const SUBSCRIPTS = "₀₁₂₃₄₅₆₇₈₉";

/** What stands for a character in mathematics. */
const MATHEMATICS = new Map<string, string>([
  ...pairs(GREEK),
  ...pairs(SIGNS),
  ...[..."ℤ Z ℚ Q ℝ R ℂ C ℕ N ℙ P 𝔽 F ℍ H".split(" ")].flatMap((sign, index, all): [string, string][] =>
    index % 2 === 0 ? [[sign, `\\mathbb{${all[index + 1]}}`]] : [],
  ),
  ...[...SUPERSCRIPTS].map((sign, digit): [string, string] => [sign, `{}^{${digit}}`]),
  ...[...SUBSCRIPTS].map((sign, digit): [string, string] => [sign, `{}_{${digit}}`]),
  ["⁻", "{}^{-}"],
  ["ⁿ", "{}^{n}"],
  ["\u2032", "{}'"],
]);

const TYPOGRAPHY: Readonly<Record<string, string>> = {
  "–": "--",
  "—": "---",
  "‘": "`",
  "’": "'",
  "“": "``",
  "”": "''",
  "\u00A0": "~",
  "\u202F": "\\,",
  "\u2009": "\\,",
  "\u200B": "",
  "…": "\\ldots{}",
  "§": "\\S{}",
  "©": "\\textcopyright{}",
  "°": "\\textdegree{}",
};

/** Latin letters with accents, which every engine knows from UTF-8. */
const LATIN = /^[\u00A1-\u017F]$/;

/** A text in a paragraph. */
export function textTex(text: string): string {
  return [...text.normalize("NFC")].map(characterTex).join("");
}

function characterTex(character: string): string {
  const known = RESERVED[character] ?? TYPOGRAPHY[character];
  if (known !== undefined) return known;
  const code = character.codePointAt(0) ?? 0;
  if (code < 32 && character !== "\n" && character !== "\t") return "";
  if (code < 127) return character;
  const formula = MATHEMATICS.get(character);
  if (formula !== undefined) return `\\ensuremath{${formula}}`;
  return LATIN.test(character) ? character : `\\othersign{${code.toString(16).toUpperCase()}}{${character}}`;
}

/** A formula as it stands, but for characters that an engine may not know. */
export function formulaTex(tex: string): string {
  return [...tex.normalize("NFC")]
    .map((character) => {
      if ((character.codePointAt(0) ?? 0) < 127) return character;
      const known = MATHEMATICS.get(character);
      if (known !== undefined) return `\\ensuremath{${known}}`;
      return LATIN.test(character) ? `\\text{${character}}` : characterTex(character);
    })
    .join("");
}

const CODE: Readonly<Record<string, string>> = {
  "-": "-{}",
  "`": "\\textasciigrave{}",
  "'": "\\textquotesingle{}",
  '"': "\\textquotedbl{}",
  "<": "\\textless{}",
  ">": "\\textgreater{}",
};

/** Characters without a blank, after which a line of code may break all the same. */
const UNBROKEN = 24;

/** A line of code: every blank and sign as typed; it may break at blanks and inside very long words. */
export function codeTex(line: string): string {
  const [indent = ""] = /^ */.exec(line) ?? [];
  let run = 0;
  const rest = [...line.slice(indent.length)].map((character, index, all) => {
    if (character === " ") {
      run = 0;
      return all[index - 1] === " " ? "\\ " : " ";
    }
    run++;
    const tex = CODE[character] ?? characterTex(character);
    return run % UNBROKEN === 0 ? `${tex}\\allowbreak{}` : tex;
  });
  return `${indent === "" ? "" : `\\codeindent{${indent.length}}`}${rest.join("")}`;
}
