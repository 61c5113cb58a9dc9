// The connection file: where the host wants the five sockets, and the key that signs the messages.
import { readFileSync } from "node:fs";
import { ProtocolError } from "./errors.ts";

export const CHANNELS = ["shell", "iopub", "stdin", "control", "hb"] as const;
export type Channel = (typeof CHANNELS)[number];

export interface CurveKeys {
  readonly publicKey: string;
  readonly secretKey: string;
}

export interface Connection {
  readonly transport: "tcp" | "ipc";
  readonly ip: string;
  readonly ports: Readonly<Record<Channel, number>>;
  /** Hash of the signature, as the engine names it ("sha256"). */
  readonly hash: string;
  /** Empty: messages are not signed. */
  readonly key: string;
  /** Present when the host wants all five sockets encrypted. */
  readonly curve?: CurveKeys;
}

const HASHES = ["sha256", "sha512", "sha384", "sha224", "sha1", "md5"];
const RESTART = "Restart the kernel from the host, which writes a new file.";

/**
 * Reads and checks a connection file.
 *
 * Throws   ProtocolError, whose one-line message names the file and what is wrong with it, without the key.
 * Source   the protocol's "Connection files"; JSON schema of enhancement proposal 106.
 */
export function readConnection(file: string): Connection {
  return parseConnection(readText(file), file);
}

/** As `readConnection`, from the text; `name` is for the message only. */
export function parseConnection(text: string, name: string): Connection {
  const fault = (given: string, expected: string) =>
    new ProtocolError({ subject: `connection file ${name}`, given, expected, hint: RESTART });
  const fields = parseObject(text, fault);
  if (Object.hasOwn(fields, "registration_port")) {
    throw fault('a registration file (it has "registration_port")', "a classic connection file with five ports");
  }
  const transport = fields.transport ?? "tcp";
  if (transport !== "tcp" && transport !== "ipc") throw fault(`transport ${show(transport)}`, '"tcp" or "ipc"');
  const ip = fields.ip;
  if (typeof ip !== "string" || ip === "") throw fault(given(fields, "ip"), "an address to bind");
  const key = fields.key ?? "";
  if (typeof key !== "string") throw fault("a key that is not a string", "a string (empty switches signing off)");
  const curve = curveKeys(fields, fault);
  return {
    transport,
    ip,
    ports: portsOf(fields, transport, fault),
    hash: hashOf(fields, fault),
    key,
    ...(curve ? { curve } : {}),
  };
}

type Fields = Readonly<Record<string, unknown>>;
type Fault = (given: string, expected: string) => ProtocolError;

function readText(file: string): string {
  try {
    return readFileSync(file, "utf8");
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    const given = code === "ENOENT" ? "no such file" : `it cannot be read (${code})`;
    const expected = "the JSON file that the host wrote";
    throw new ProtocolError({ subject: `connection file ${file}`, given, expected, hint: RESTART });
  }
}

function parseObject(text: string, fault: Fault): Fields {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    throw fault(text.trim() === "" ? "it is empty" : "it is not JSON", "a JSON object");
  }
  if (typeof value !== "object" || value === null || Array.isArray(value)) {
    throw fault("JSON, but no object", "a JSON object");
  }
  return value as Fields;
}

function portsOf(fields: Fields, transport: string, fault: Fault): Record<Channel, number> {
  const ports = { shell: 0, iopub: 0, stdin: 0, control: 0, hb: 0 };
  for (const channel of CHANNELS) {
    const name = `${channel}_port`;
    const port = portNumber(fields[name]);
    if (port === undefined) {
      const range = transport === "tcp" ? "ports from 1 to 65535" : "numbers";
      throw fault(given(fields, name), `shell, iopub, stdin, control and hb ${range}`);
    }
    ports[channel] = port;
  }
  const twice = CHANNELS.find((channel, at) => CHANNELS.slice(0, at).some((other) => ports[other] === ports[channel]));
  if (twice) throw fault(`port ${ports[twice]} named twice`, "five different ports");
  return ports;
}

// The schema allows a port as a string too.
function portNumber(value: unknown): number | undefined {
  const port = typeof value === "string" && /^\d{1,5}$/.test(value) ? Number(value) : value;
  return typeof port === "number" && Number.isInteger(port) && port >= 1 && port <= 65_535 ? port : undefined;
}

function hashOf(fields: Fields, fault: Fault): string {
  const scheme = fields.signature_scheme ?? "hmac-sha256";
  const hash = typeof scheme === "string" && scheme.startsWith("hmac-") ? scheme.slice("hmac-".length) : "";
  if (!HASHES.includes(hash)) throw fault(`signature_scheme ${show(scheme)}`, '"hmac-sha256" or another hmac scheme');
  return hash;
}

function curveKeys(fields: Fields, fault: Fault): CurveKeys | undefined {
  const { curve_publickey: publicKey, curve_secretkey: secretKey } = fields;
  if (publicKey == null && secretKey == null) return undefined;
  if (!isZ85Key(publicKey) || !isZ85Key(secretKey)) {
    throw fault("an unusable pair of curve keys", "curve_publickey and curve_secretkey of 40 Z85 characters each");
  }
  return { publicKey, secretKey };
}

function isZ85Key(value: unknown): value is string {
  return typeof value === "string" && /^[0-9A-Za-z.\-:+=^!/*?&<>()[\]{}@%$#]{40}$/.test(value);
}

function given(fields: Fields, name: string): string {
  return Object.hasOwn(fields, name) ? `"${name}" is ${show(fields[name])}` : `no "${name}"`;
}

function show(value: unknown): string {
  const text = JSON.stringify(value) ?? "undefined";
  return text.length > 60 ? `${text.slice(0, 57)}...` : text;
}

/** Address of one socket, as ZeroMQ wants it. */
export function endpoint(connection: Connection, channel: Channel): string {
  const { transport, ip, ports } = connection;
  if (transport === "ipc") return `ipc://${ip}-${ports[channel]}`;
  // bind takes no names, and a host may be set to the one name that everybody has
  const address = ip === "localhost" ? "127.0.0.1" : ip;
  return `tcp://${address.includes(":") ? `[${address}]` : address}:${ports[channel]}`;
}

/** Path of the socket file of a channel, undefined over tcp. */
export function socketFile(connection: Connection, channel: Channel): string | undefined {
  return connection.transport === "ipc" ? `${connection.ip}-${connection.ports[channel]}` : undefined;
}
