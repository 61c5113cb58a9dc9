// The kernel's end of the protocol: messages in, messages out. What they mean is the service's business.
import { createEncoder, decode } from "./codec.ts";
import type { Connection } from "./connection.ts";
import { log, logDropped } from "./log.ts";
import type { Message, Outgoing } from "./message.ts";
import { patiently } from "./patience.ts";
import { createSendQueue, type SendQueue } from "./queue.ts";
import { createSigner, type Signer } from "./signer.ts";
import { closeSockets, openSockets, type Sockets } from "./sockets.ts";

export type RequestChannel = "shell" | "control" | "stdin";

export interface Wire {
  /** Names this process; a client knows a restart by a new one. */
  readonly session: string;
  /** Resolves when the first subscriber of iopub has come. */
  readonly subscribed: Promise<void>;
  /** Bytes handed over for iopub that its socket has not taken yet. */
  readonly pendingBytes: number;
  /** How many messages have come in so far, bad ones counted. */
  readonly received: Readonly<Record<RequestChannel, number>>;
  /** Sends to one client, by the identities that its request came with, and gives the msg_id. */
  send(channel: RequestChannel, identities: readonly Buffer[], outgoing: Outgoing): string;
  /** Publishes to every subscriber of the topic, which is the type unless given. */
  publish(outgoing: Outgoing, topic?: string): void;
  /** Resolves when all that was published before has been handed to the socket. */
  published(): Promise<void>;
  /** Starts to take in messages: good ones go to `receivers`, bad ones are dropped. To be called once. */
  serve(receivers: Receivers): void;
  /** Sends what is queued, closes the sockets, frees the ports. Safe to call twice. */
  close(): Promise<void>;
}

export type Receivers = Readonly<Record<RequestChannel, (message: Message) => void>>;

/** How long `close` waits for its queues, in ms; a socket that takes nothing must not hold up the end. */
const CLOSING = 500;

/**
 * Binds the sockets of the connection; from then on heartbeats are echoed and subscribers welcomed until `close`.
 *
 * Throws   ProtocolError if an address cannot be bound.
 */
export async function openWire(connection: Connection): Promise<Wire> {
  const sockets = await openSockets(connection);
  const signer = createSigner(connection.hash, connection.key);
  const encoder = createEncoder(signer, "halfperiod");
  const queues = {
    shell: queueFor(sockets, "shell"),
    control: queueFor(sockets, "control"),
    stdin: queueFor(sockets, "stdin"),
    iopub: createSendQueue(patiently(sockets.iopub), (error) => logUnsent("iopub", error)),
    hb: queueFor(sockets, "hb"),
  };
  const received = { shell: 0, control: 0, stdin: 0 };
  void serve("hb", sockets.hb, (frames) => queues.hb.push(frames));

  const publish = (outgoing: Outgoing, topic = outgoing.type) =>
    queues.iopub.push(encoder.encode([Buffer.from(topic, "utf8")], outgoing).frames);
  const subscribed = new Promise<void>((resolve) => {
    void serve("iopub", sockets.iopub, ([event]) => {
      const topic = event && subscriptionOf(event);
      if (topic === undefined) return;
      publish({ type: "iopub_welcome", content: { subscription: topic } }, topic);
      resolve();
    });
  });

  let closing: Promise<void> | undefined;
  return {
    session: encoder.session,
    subscribed,
    get pendingBytes() {
      return queues.iopub.bytes;
    },
    received,
    send(channel, identities, outgoing) {
      const { id, frames } = encoder.encode(identities, outgoing);
      queues[channel].push(frames);
      return id;
    },
    publish,
    published: () => queues.iopub.drained(),
    serve(receivers) {
      for (const channel of ["shell", "control", "stdin"] as const) {
        void serve(channel, sockets[channel], (frames) => {
          received[channel] += 1;
          receive(channel, frames, signer, receivers[channel]);
        });
      }
    },
    close() {
      closing ??= closeWhenSent(Object.values(queues), sockets, connection);
      return closing;
    },
  };
}

function queueFor(sockets: Sockets, channel: keyof Sockets): SendQueue {
  return createSendQueue(sockets[channel], (error) => logUnsent(channel, error));
}

function logUnsent(channel: string, error: unknown): void {
  log(`${channel}: a message could not be sent (${error})`);
}

function receive(channel: string, frames: Buffer[], signer: Signer, receiver: (message: Message) => void): void {
  const decoded = decode(frames, signer);
  if ("fault" in decoded) logDropped(channel, decoded.fault);
  else receiver(decoded.message);
}

type Source = AsyncIterable<Buffer[]> & { readonly closed: boolean };

/** Reads a socket until it is closed. Neither a bad message nor a fault of the handler ends the loop. */
async function serve(channel: string, socket: Source, handle: (frames: Buffer[]) => void): Promise<void> {
  while (!socket.closed) {
    try {
      for await (const frames of socket) guarded(channel, () => handle(frames));
    } catch (error) {
      if (socket.closed) return;
      log(`${channel}: ${error}`);
      await new Promise((resolve) => setTimeout(resolve, 10)); // no busy loop if the socket itself is ill
    }
  }
}

function guarded(channel: string, handle: () => void): void {
  try {
    handle();
  } catch (error) {
    log(`${channel}: ${error instanceof Error ? error.stack : error}`);
  }
}

/** Topic of a subscription event; undefined for its end, for other bytes and for a topic that is no UTF-8. */
function subscriptionOf(event: Buffer): string | undefined {
  if (event[0] !== 1) return undefined;
  try {
    return new TextDecoder("utf-8", { fatal: true, ignoreBOM: true }).decode(event.subarray(1));
  } catch {
    return undefined;
  }
}

async function closeWhenSent(queues: SendQueue[], sockets: Sockets, connection: Connection): Promise<void> {
  let timer: NodeJS.Timeout | undefined;
  const limit = new Promise((resolve) => {
    timer = setTimeout(resolve, CLOSING);
  });
  await Promise.race([Promise.all(queues.map((queue) => queue.drained())), limit]);
  clearTimeout(timer);
  closeSockets(sockets, connection);
}
