// Between frames and messages: identities, delimiter, signature, four JSON objects, buffers.
import { randomUUID } from "node:crypto";
import type { Header, Json, Message, Outgoing } from "./message.ts";
import type { Signer } from "./signer.ts";

/** Claimed in every header and in kernel_info: XPUB with welcome, kernel_info on control. */
export const PROTOCOL_VERSION = "5.5";

const DELIMITER = Buffer.from("<IDS|MSG>");
const EMPTY_OBJECT = Buffer.from("{}");
/** Signature and four JSON frames follow the delimiter. */
const FIXED_FRAMES = 5;

export type Decoded = { readonly message: Message } | { readonly fault: string };

/**
 * Reads the frames of one message. Whatever is wrong with them comes back as a `fault`, in words for the log: a frame
 * from outside must never end the loop that reads it. The signature is checked before anything is parsed.
 *
 * Cost   linear in the bytes.
 */
export function decode(frames: readonly Buffer[], signer: Signer): Decoded {
  const at = frames.findIndex((frame) => frame.equals(DELIMITER));
  if (at < 0) return { fault: "no delimiter frame" };
  const [signature, ...rest] = frames.slice(at + 1, at + 1 + FIXED_FRAMES);
  if (!signature || rest.length < FIXED_FRAMES - 1) return { fault: "too few frames" };
  if (!signer.matches(signature, rest)) return { fault: "wrong signature" };
  const [header, parentHeader, metadata, content] = rest.map(parseObject);
  if (!header || !parentHeader || !metadata || !content) return { fault: "a part that is no JSON object" };
  if (typeof header.msg_type !== "string") return { fault: "a header without msg_type" };
  if (!signer.firstUse(signature)) return { fault: "a message seen before" };
  return {
    message: {
      identities: frames.slice(0, at),
      header: header as Header,
      headerBytes: rest[0] as Buffer,
      parentHeader,
      metadata,
      content,
      buffers: frames.slice(at + 1 + FIXED_FRAMES),
    },
  };
}

function parseObject(frame: Buffer): Json | undefined {
  try {
    const value: unknown = JSON.parse(STRICT_UTF8.decode(frame));
    return typeof value === "object" && value !== null && !Array.isArray(value) ? (value as Json) : undefined;
  } catch {
    return undefined; // no UTF-8, no JSON, or nested deeper than the parser's stack
  }
}

const STRICT_UTF8 = new TextDecoder("utf-8", { fatal: true, ignoreBOM: true });

export interface Encoder {
  /** Names this process: clients know a restart by a new one. */
  readonly session: string;
  /** A new message behind the given prefix (identities of the requester, or the topic), and its msg_id. */
  encode(prefix: readonly Buffer[], outgoing: Outgoing): { readonly id: string; readonly frames: Buffer[] };
}

/** Encoder with a session id of its own; every message gets a fresh msg_id, and the bytes that are signed are sent. */
export function createEncoder(signer: Signer, username: string): Encoder {
  const session = randomUUID();
  let count = 0;
  return {
    session,
    encode(prefix, { type, content, metadata, buffers = [], parent }) {
      count += 1;
      const id = `${session}_${count}`;
      const header = {
        msg_id: id,
        session,
        username,
        date: new Date().toISOString(),
        msg_type: type,
        version: PROTOCOL_VERSION,
      };
      const parts = [
        toFrame(header),
        parent?.headerBytes ?? EMPTY_OBJECT,
        metadata ? toFrame(metadata) : EMPTY_OBJECT,
        toFrame(content),
      ];
      const signature = Buffer.from(signer.sign(parts), "latin1");
      return { id, frames: [...prefix, DELIMITER, signature, ...parts, ...buffers] };
    },
  };
}

// JSON.stringify writes a lone surrogate as an escape, so the frame is UTF-8 whatever a cell printed.
function toFrame(value: Json): Buffer {
  return Buffer.from(JSON.stringify(value), "utf8");
}
