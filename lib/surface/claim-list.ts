// The claims of this session in the order of their first making, so that a notebook can list them at its end.

import type { Claim } from "./claim-value.ts";

const made = new Map<string, Claim>();

/** Keeps a claim; one of the same name that was made before (a cell that ran twice) gives way. */
export function recordClaim(claim: Claim): void {
  made.set(claim.name, claim);
}

export function claimList(): readonly Claim[] {
  return [...made.values()];
}
