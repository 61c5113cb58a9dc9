import { weakest } from "../proof/standing.ts";
import { claimList } from "../surface/claim-list.ts";
import { standingBrief, standingHead } from "./standing.ts";
import { type Table, table } from "./table.ts";

/**
 * A table of the claims made so far, in their order, with their standings; its caption gives the standing of all of them
 * together, which is that of the weakest. A claim that was made again under its name counts once, as it was made last.
 *
 * @example claims()   // as the last cell of a notebook
 */
export function claims(): Table {
  const list = claimList();
  const kinds = list.map(({ standing }) => standing.kind);
  const counts = [...new Set(kinds)].map((kind) => `${kinds.filter((other) => other === kind).length} ${kind}`);
  const together = list.length === 0 ? "" : `; together ${standingHead(weakest(list.map(({ standing }) => standing)))}`;
  return table(
    list.map((claim) => [claim.name, claim, standingBrief(claim.standing)]),
    { columns: ["claim", "statement", "standing"], caption: `Claims: ${counts.join(", ") || "none"}${together}` },
  );
}
