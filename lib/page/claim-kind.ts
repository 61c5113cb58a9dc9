import { Complex, Real } from "../number/values.ts";
import type { Claim } from "../surface/claim-value.ts";
import { TorsionSubgroup } from "../surface/torsion.ts";
import type { Kind, Show } from "./kind.ts";
import { prose } from "./prose.ts";
import { LINE_DIGITS, shortTex, shortText } from "./short.ts";
import { standingProse, standingTex, standingText } from "./standing.ts";
import { texProse } from "./tex.ts";

const RELATIONS: Readonly<Record<Claim["relation"], string>> = {
  "=": "=",
  "≠": "\\ne",
  "<": "<",
  "≤": "\\le",
  on: "\\text{ on }",
  in: "\\in",
  homothetic: "\\text{ homothetic to }",
  and: "\\text{ and }",
};

export const claimKind: Kind<Claim> = {
  text: (claim, show) =>
    `${claim.name.replace(/\$/g, "")}: ${statementText(claim, show)}   ${standingText(claim.standing)}${inputs(claim)}`,
  tex: (claim, show) =>
    `${texProse(claim.name)}{:}\\; ${statementTex(claim, show)} \\quad ${standingTex(claim.standing)}`,
  // Running text, so that a line that is too long for the page can break between words.
  prose: (claim, show) => {
    return `${prose(claim.name)}: $\\displaystyle ${statementTex(claim, show)}$ — ${standingProse(claim.standing)}${prose(inputs(claim))}`;
  },
  // In a table the name and the standing have columns of their own.
  cell: (claim, show) => ({
    kind: "formula",
    text: statementText(claim, show, CELL_DIGITS),
    tex: statementTex(claim, show, CELL_DIGITS),
  }),
  data: (claim, show) => ({
    kind: "claim",
    name: claim.name,
    lhs: claim.relation === "and" ? names(claim) : show.data(claim.lhs),
    relation: claim.relation,
    rhs: show.data(claim.rhs),
    standing: standingData(claim),
  }),
};

/** The names of the claims that one states together. */
function names({ lhs }: Claim): string[] {
  return (lhs as readonly Claim[]).map(({ name }) => name);
}

function standingData({ standing }: Claim): { readonly [key: string]: string } {
  return Object.fromEntries(Object.entries(standing).map(([key, value]) => [key, String(value)]));
}

/** The measured inputs, and the doubles, that the statement rests on. */
function inputs({ lhs, rhs }: Claim): string {
  const all = [lhs, rhs].flatMap((side) => (side instanceof Real || side instanceof Complex ? side.inputs : []));
  return all.length === 0 ? "" : `, given ${[...new Set(all)].join(", ")}`;
}

const CELL_DIGITS = 6;

function statementText(claim: Claim, show: Show, digits = LINE_DIGITS): string {
  if (claim.relation === "and") return names(claim).join(" and ").replace(/\$/g, "");
  const relation = claim.relation === "homothetic" ? "homothetic to" : claim.relation;
  const order = countsElements(claim) ? "#" : "";
  return `${order}${shortText(claim.lhs, show, digits)} ${relation} ${wordsOr(claim.rhs, shortText(claim.rhs, show, digits))}`;
}

function statementTex(claim: Claim, show: Show, digits = LINE_DIGITS): string {
  if (claim.relation === "and") return names(claim).map(texProse).join("\\text{ and }");
  const order = countsElements(claim) ? "\\#" : "";
  return `${order}${shortTex(claim.lhs, show, digits)} ${RELATIONS[claim.relation]} ${groupTex(claim.rhs) ?? shortTex(claim.rhs, show, digits)}`;
}

/** A group compared with a number is compared by its order. */
function countsElements({ lhs, rhs }: Claim): boolean {
  return lhs instanceof TorsionSubgroup && ["number", "bigint"].includes(typeof rhs);
}

/** Words, such as the name of a group, without quotation marks. */
function wordsOr(value: unknown, text: string): string {
  return typeof value === "string" ? value : text;
}

/** Z/2 × Z/4 with blackboard letters. */
function groupTex(value: unknown): string | undefined {
  if (typeof value !== "string" || !/^\s*Z\/\d+(\s*[×x]\s*Z\/\d+)*\s*$/.test(value)) return undefined;
  return value
    .trim()
    .replace(/Z\/(\d+)/g, "\\mathbb{Z}/$1")
    .replace(/\s*[×x]\s*/g, " \\times ");
}
