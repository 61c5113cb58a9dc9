// A client of the protocol for the tests, written from the protocol's text and not from the kernel's code: it has its own
// framing and signing, so that a fault of the kernel's codec cannot hide behind itself.
import { createHmac, randomUUID } from "node:crypto";
import { createServer } from "node:net";
import { curveKeyPair, Dealer, Request, Subscriber } from "zeromq";

export interface ConnectionFields {
  transport: string;
  ip: string;
  shell_port: number;
  iopub_port: number;
  stdin_port: number;
  control_port: number;
  hb_port: number;
  signature_scheme: string;
  key: string;
}

export interface Received {
  readonly prefix: readonly Buffer[];
  readonly signature: string;
  readonly header: Record<string, unknown> & { msg_type: string; msg_id: string };
  readonly parent: Record<string, unknown>;
  readonly metadata: Record<string, unknown>;
  // biome-ignore lint/suspicious/noExplicitAny: contents are read field by field and each field is then asserted
  readonly content: Record<string, any>;
  readonly buffers: readonly Buffer[];
}

export interface Exchange {
  readonly id: string;
  readonly reply: Received;
  /** What was published with this request as parent, busy and idle included. */
  readonly published: readonly Received[];
}

/** Fields of a connection file with free ports. */
export async function freeConnection(): Promise<ConnectionFields> {
  const [shell_port, iopub_port, stdin_port] = [await freePort(), await freePort(), await freePort()];
  const [control_port, hb_port] = [await freePort(), await freePort()];
  const fixed = { transport: "tcp", ip: "127.0.0.1", signature_scheme: "hmac-sha256", key: randomUUID() };
  return { ...fixed, shell_port, iopub_port, stdin_port, control_port, hb_port };
}

/**
 * Ports below those that the system gives to outgoing connections, so that none of them can take one between the choice
 * and the kernel's bind. Each process of the tests begins elsewhere and takes none twice.
 */
const PORTS = { first: 12_000, count: 20_000 };
let nextPort = (process.pid * 211) % PORTS.count;

async function freePort(): Promise<number> {
  for (let tries = 0; tries < PORTS.count; tries += 1) {
    const port = PORTS.first + nextPort;
    nextPort = (nextPort + 1) % PORTS.count;
    if (await isFree(port)) return port;
  }
  throw new Error("no port is free");
}

function isFree(port: number): Promise<boolean> {
  return new Promise((resolve) => {
    const server = createServer();
    server.once("error", () => resolve(false));
    server.listen(port, "127.0.0.1", () => server.close(() => resolve(true)));
  });
}

const DELIMITER = Buffer.from("<IDS|MSG>");

/** One client with its own session: shell, control, stdin, iopub and heartbeat. */
export class Client {
  readonly session: string = randomUUID();
  readonly shell: Dealer;
  readonly control: Dealer;
  readonly stdin: Dealer;
  readonly iopub: Subscriber;
  readonly heartbeat: Request;
  /** All that came on iopub, in order. */
  readonly published: Received[] = [];
  readonly replies: Received[] = [];
  readonly questions: Received[] = [];
  private readonly fields: ConnectionFields;
  private readonly waiting = new Set<() => void>();

  /** `serverKey`: public key of a kernel whose sockets are encrypted. */
  constructor(fields: ConnectionFields, serverKey?: string) {
    this.fields = fields;
    const secure = serverKey ? encrypted(serverKey) : {};
    this.iopub = new Subscriber({ linger: 0, receiveHighWaterMark: 0, ...secure });
    this.heartbeat = new Request({ linger: 0, receiveTimeout: 20_000, ...secure });
    const options = { routingId: this.session, linger: 0, ...secure };
    this.shell = new Dealer(options);
    this.control = new Dealer(options);
    this.stdin = new Dealer(options);
  }

  /** Connects, and waits for the welcome of iopub unless told not to listen. */
  async connect({ listen = true } = {}): Promise<this> {
    const { transport, ip } = this.fields;
    const address = (port: number) => `${transport}://${ip}${transport === "ipc" ? "-" : ":"}${port}`;
    this.shell.connect(address(this.fields.shell_port));
    this.control.connect(address(this.fields.control_port));
    this.stdin.connect(address(this.fields.stdin_port));
    this.heartbeat.connect(address(this.fields.hb_port));
    this.collect(this.shell, this.replies);
    this.collect(this.control, this.replies);
    this.collect(this.stdin, this.questions);
    if (!listen) return this;
    this.iopub.connect(address(this.fields.iopub_port));
    this.iopub.subscribe("");
    this.collect(this.iopub, this.published);
    await this.until(() => this.published.some(({ header }) => header.msg_type === "iopub_welcome"));
    return this;
  }

  close(): void {
    for (const socket of [this.shell, this.control, this.stdin, this.iopub, this.heartbeat]) socket.close();
  }

  header(type: string): Record<string, unknown> & { msg_id: string } {
    const date = new Date().toISOString();
    return { msg_id: randomUUID(), session: this.session, username: "test", date, msg_type: type, version: "5.5" };
  }

  /** Frames of a signed message; `key` and `parent` may be wrong on purpose. */
  frames(header: object, content: unknown, { key = this.fields.key, parent = {}, metadata = {} } = {}): Buffer[] {
    const parts = [header, parent, metadata, content].map((part) => Buffer.from(JSON.stringify(part)));
    return [DELIMITER, Buffer.from(sign(key, parts, this.fields.signature_scheme)), ...parts];
  }

  async send(channel: "shell" | "control" | "stdin", type: string, content: object, parent: object = {}) {
    const header = this.header(type);
    await this[channel].send(this.frames(header, content, { parent }));
    return header.msg_id;
  }

  /** Sends a request and waits for its reply and its idle. */
  async request(channel: "shell" | "control", type: string, content: object = {}): Promise<Exchange> {
    return this.exchange(await this.send(channel, type, content));
  }

  execute(code: string, options: object = {}): Promise<Exchange> {
    return this.request("shell", "execute_request", { code, ...options });
  }

  /** Waits for the reply and the idle of a request that was sent. */
  async exchange(id: string): Promise<Exchange> {
    const reply = await this.until(() => this.replies.find(({ parent }) => parent.msg_id === id));
    await this.idle(id);
    return { id, reply, published: this.of(id) };
  }

  idle(id: string): Promise<true> {
    return this.until(() => this.of(id).some(({ content }) => content.execution_state === "idle") || undefined);
  }

  /** Drops what has come so far. */
  forget(): void {
    for (const list of [this.published, this.replies, this.questions]) list.length = 0;
  }

  /** What was published so far with the request as parent. */
  of(id: string): Received[] {
    return this.published.filter(({ parent }) => parent.msg_id === id);
  }

  /** The first value that is neither undefined nor false, looked for at each message that comes. */
  until<T>(look: () => T | undefined | false, ms = 25_000): Promise<T> {
    return new Promise((resolve, reject) => {
      const again = () => {
        const found = look();
        if (found === undefined || found === false) return;
        clearTimeout(timer);
        this.waiting.delete(again);
        resolve(found);
      };
      const timer = setTimeout(() => {
        this.waiting.delete(again);
        const seen = this.published.map(({ header, content }) => content.execution_state ?? header.msg_type);
        reject(new Error(`nothing such came in ${ms} ms; published: ${seen.join(" ")}`));
      }, ms);
      this.waiting.add(again);
      again();
    });
  }

  private async collect(socket: AsyncIterable<Buffer[]>, into: Received[]): Promise<void> {
    for await (const frames of socket) {
      into.push(read(frames, this.fields));
      for (const look of [...this.waiting]) look();
    }
  }
}

function encrypted(serverKey: string) {
  const { publicKey, secretKey } = curveKeyPair();
  return { curveServerKey: serverKey, curvePublicKey: publicKey, curveSecretKey: secretKey };
}

/** What a request published, in short: states, and types of messages. */
export function summary(published: readonly Received[]): string[] {
  return published.map(({ header, content }) => content.execution_state ?? header.msg_type);
}

function read(frames: readonly Buffer[], { key, signature_scheme }: ConnectionFields): Received {
  const at = frames.findIndex((frame) => frame.equals(DELIMITER));
  const [signature, ...rest] = frames.slice(at + 1) as [Buffer, ...Buffer[]];
  const parts = rest.slice(0, 4);
  if (signature.toString() !== sign(key, parts, signature_scheme)) throw new Error("the kernel signed wrongly");
  const [header, parent, metadata, content] = parts.map((part) => JSON.parse(part.toString("utf8")));
  const prefix = frames.slice(0, at);
  return { prefix, signature: signature.toString(), header, parent, metadata, content, buffers: rest.slice(4) };
}

function sign(key: string, parts: readonly Buffer[], scheme: string): string {
  return key === "" ? "" : createHmac(scheme.replace("hmac-", ""), key).update(Buffer.concat(parts)).digest("hex");
}
