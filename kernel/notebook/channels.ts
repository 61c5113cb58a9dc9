// The client's end of the five channels: sends requests, tells of every message that comes.
import { randomBytes } from "node:crypto";
import { Dealer, Subscriber } from "zeromq";
import { createEncoder, decode } from "../wire/codec.ts";
import { type Connection, endpoint } from "../wire/connection.ts";
import type { Json, Message } from "../wire/message.ts";
import { createSendQueue, type SendQueue } from "../wire/queue.ts";
import { createSigner } from "../wire/signer.ts";

export type RequestChannel = "shell" | "control" | "stdin";
export type IncomingChannel = RequestChannel | "iopub";

export interface Channels {
  /** Resolves when the kernel's end of all channels has answered: before that, what it sends here is lost. */
  readonly connected: Promise<unknown>;
  /** Sends a message and gives its id. */
  send(channel: RequestChannel, type: string, content: Json): string;
  /** When the kernel last answered the heartbeat, by `performance.now()`. */
  readonly lastBeat: number;
  close(): void;
}

/** Time between two heartbeats, in ms. */
const BEAT = 2000;
/** Time between two tries to reach a kernel that has not bound its ports yet, in ms. */
const RETRY = 15;

/** Connects to a kernel. `onMessage` hears every message with a right signature, in order of arrival on each channel. */
export function openChannels(
  connection: Connection,
  onMessage: (channel: IncomingChannel, message: Message) => void,
): Channels {
  // Shell and stdin of one client share an identity: that is how the kernel finds the one whom to ask for input.
  const shared = { linger: 0, reconnectInterval: RETRY };
  const options = { ...shared, routingId: randomBytes(8).toString("hex") };
  const sockets = { shell: new Dealer(options), control: new Dealer(options), stdin: new Dealer(options) };
  const iopub = new Subscriber({ ...shared, receiveHighWaterMark: 0 });
  const hb = new Dealer(shared);
  const encoder = createEncoder(createSigner(connection.hash, connection.key), "halfperiod");
  const queues = mapValues(sockets, (socket): SendQueue => createSendQueue(socket, () => undefined));
  const connected = Promise.all([...Object.values(sockets), iopub, hb].map(handshake));
  let lastBeat = performance.now();

  for (const channel of ["shell", "control", "stdin"] as const) {
    sockets[channel].connect(endpoint(connection, channel));
    receive(sockets[channel], connection, (message) => onMessage(channel, message));
  }
  iopub.connect(endpoint(connection, "iopub"));
  iopub.subscribe();
  receive(iopub, connection, (message) => onMessage("iopub", message));
  hb.connect(endpoint(connection, "hb"));
  void eachMessage(hb, () => {
    lastBeat = performance.now();
  });
  const beats = createSendQueue(hb, () => undefined);
  const timer = setInterval(() => beats.push([Buffer.alloc(0), Buffer.from("beat")]), BEAT);
  timer.unref();

  return {
    connected,
    send(channel, type, content) {
      const { id, frames } = encoder.encode([], { type, content });
      queues[channel].push(frames);
      return id;
    },
    get lastBeat() {
      return lastBeat;
    },
    close() {
      clearInterval(timer);
      for (const socket of [...Object.values(sockets), iopub, hb]) socket.close();
    },
  };
}

function handshake(socket: Dealer | Subscriber): Promise<void> {
  return new Promise((resolve) => socket.events.on("handshake", () => resolve()));
}

type Receiver = Dealer | Subscriber;

function receive(socket: Receiver, connection: Connection, onMessage: (message: Message) => void): void {
  const signer = createSigner(connection.hash, connection.key);
  void eachMessage(socket, (frames) => {
    const decoded = decode(frames, signer);
    if ("message" in decoded) onMessage(decoded.message);
  });
}

async function eachMessage(socket: Receiver, take: (frames: Buffer[]) => void): Promise<void> {
  try {
    for await (const frames of socket) take(frames);
  } catch (error) {
    if (!socket.closed) throw error;
  }
}

function mapValues<K extends string, A, B>(record: Record<K, A>, change: (value: A) => B): Record<K, B> {
  const entries = Object.entries<A>(record).map(([key, value]) => [key, change(value)]);
  return Object.fromEntries(entries) as Record<K, B>;
}
