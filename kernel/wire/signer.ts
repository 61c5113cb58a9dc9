// Signatures: HMAC over the four JSON frames as bytes, and the memory that keeps a recorded message from working twice.
import { createHmac, timingSafeEqual } from "node:crypto";

/** Signatures remembered. Some tens of thousands: a day of heavy work, about 10 MB when full. */
const REMEMBERED = 65_536;

export interface Signer {
  /** Lower-case hex; empty when the key is empty. */
  sign(frames: readonly Buffer[]): string;
  /** True if the signature is right, whatever was seen before. Takes the same time wherever the first difference is. */
  matches(signature: Buffer, frames: readonly Buffer[]): boolean;
  /** True the first time a right signature comes by, false for a replay. Without a key always true. */
  firstUse(signature: Buffer): boolean;
}

/** Signer of one connection; `hash` and `key` as in the connection file. */
export function createSigner(hash: string, key: string, remembered = REMEMBERED): Signer {
  const keyBytes = Buffer.from(key, "utf8");
  const seen = new Set<string>();
  const sign = (frames: readonly Buffer[]): string => {
    if (keyBytes.length === 0) return "";
    const hmac = createHmac(hash, keyBytes);
    for (const frame of frames) hmac.update(frame);
    return hmac.digest("hex");
  };
  return {
    sign,
    matches(signature, frames) {
      if (keyBytes.length === 0) return true;
      const expected = Buffer.from(sign(frames), "latin1");
      return signature.length === expected.length && timingSafeEqual(signature, expected);
    },
    firstUse(signature) {
      if (keyBytes.length === 0) return true;
      const text = signature.toString("latin1");
      if (seen.has(text)) return false;
      seen.add(text);
      // a Set iterates in order of insertion: the first is the oldest
      if (seen.size > remembered) seen.delete(seen.values().next().value as string);
      return true;
    },
  };
}
