// The claims of this session in the order of their first making, so that a notebook can list them at its end.

import type { Claim } from "./claim-value.ts";

const made = new Map<string, Claim>();

/**
 * Keeps a claim. One that was made before in the same words (a cell that ran twice) gives way; another statement under the same
 * name is kept beside it, so that no refuted one is hidden by its namesake.
 */
export function recordClaim(claim: Claim): void {
  made.set(`${claim.name}: ${side(claim.lhs)} ${claim.relation} ${side(claim.rhs)}`, claim);
}

function side(value: unknown): string {
  try {
    return Array.isArray(value) ? `[${value.map(side).join()}]` : String(value);
  } catch {
    return "";
  }
}

export function claimList(): readonly Claim[] {
  return [...made.values()];
}
