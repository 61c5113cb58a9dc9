// A message as data. JSON parts are objects, always; what the wire says is checked in codec.ts.

export type Json = Readonly<Record<string, unknown>>;

/** The fields of a header that the kernel reads; a client may send more, or fewer. */
export interface Header extends Json {
  readonly msg_type: string;
}

/** What a message needs of the one that caused it: the way back, and the complete header, byte for byte. */
export interface Parent {
  readonly identities: readonly Buffer[];
  readonly headerBytes: Buffer;
}

export interface Message extends Parent {
  readonly header: Header;
  readonly parentHeader: Json;
  readonly metadata: Json;
  readonly content: Json;
  readonly buffers: readonly Buffer[];
}

/** What a sender gives; the rest of the header is added on sending. */
export interface Outgoing {
  readonly type: string;
  readonly content: Json;
  readonly metadata?: Json;
  readonly buffers?: readonly Buffer[];
  /** Absent: parent_header is {}. */
  readonly parent?: Pick<Parent, "headerBytes"> | undefined;
}
