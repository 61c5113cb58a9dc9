// The five sockets, bound where the host said, or none.
import { existsSync, rmSync } from "node:fs";
import { connect } from "node:net";
import { Router, type SocketOptions, XPublisher } from "zeromq";
import { CHANNELS, type Channel, type Connection, endpoint, socketFile } from "./connection.ts";
import { ProtocolError } from "./errors.ts";
import { LEAST_HELD } from "./patience.ts";

/**
 * How long a closed socket may go on sending what it holds, in ms: enough for the last reply on a machine that stands still
 * for a second. Without an end a stuck client would keep us alive; on iopub, where such a client leaves most, it is shorter.
 */
const LINGER = 2000;
const IOPUB_LINGER = 1000;

export interface Sockets {
  readonly shell: Router;
  readonly control: Router;
  readonly stdin: Router;
  /** XPUB: tells of subscribers, and is in verbose mode so that a second one with the same topic is told of too. */
  readonly iopub: XPublisher;
  /** A ROUTER that echoes; a REP could be wedged by a peer that breaks its lockstep. */
  readonly hb: Router;
}

/**
 * Opens and binds all five sockets.
 *
 * Throws   ProtocolError if one cannot be bound; then none stays open. Another port is never tried: the host restarts
 *          a kernel that ends early with new ones.
 */
export async function openSockets(connection: Connection): Promise<Sockets> {
  const sockets = createSockets(connection);
  const umask = connection.transport === "ipc" ? process.umask(0o077) : undefined; // socket files for this user only
  try {
    for (const channel of CHANNELS) await bindSocket(sockets, channel, connection);
    return sockets;
  } catch (error) {
    closeSockets(sockets);
    throw error;
  } finally {
    if (umask !== undefined) process.umask(umask);
  }
}

/** Closes all sockets; what they hold goes on being sent for a while. Removes ipc socket files if asked. */
export function closeSockets(sockets: Sockets, connection?: Connection): void {
  for (const channel of CHANNELS) {
    sockets[channel].linger = channel === "iopub" ? IOPUB_LINGER : LINGER;
    sockets[channel].close();
    const file = connection && socketFile(connection, channel);
    if (file) rmSync(file, { force: true });
  }
}

function createSockets(connection: Connection): Sockets {
  const shared = {
    sendHighWaterMark: 0, // a reply is never dropped
    linger: 0,
    ipv6: connection.ip.includes(":"),
    backlog: 512,
    ...curveOptions(connection),
  } satisfies SocketOptions<Router>;
  // A client that comes back with the identity of its lost connection takes it over instead of being ignored.
  const router = { ...shared, handover: true };
  return {
    shell: new Router(router),
    control: new Router(router),
    stdin: new Router(router),
    iopub: new XPublisher({
      ...shared,
      verbosity: "allSubs",
      sendHighWaterMark: LEAST_HELD,
      sendTimeout: 0,
      noDrop: true,
    }),
    hb: new Router(router),
  };
}

function curveOptions({ curve }: Connection) {
  return curve ? { curveServer: true, curvePublicKey: curve.publicKey, curveSecretKey: curve.secretKey } : {};
}

async function bindSocket(sockets: Sockets, channel: Channel, connection: Connection): Promise<void> {
  const address = endpoint(connection, channel);
  const file = socketFile(connection, channel);
  // The library removes a socket file that is in the way, even one that somebody listens on.
  if (file && existsSync(file) && (await isAnswered(file))) throw unbound(channel, address, "it is in use");
  try {
    await sockets[channel].bind(address);
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    throw unbound(channel, address, code === "EADDRINUSE" ? "it is in use" : String(code ?? error));
  }
}

function unbound(channel: Channel, address: string, why: string): ProtocolError {
  return new ProtocolError({
    subject: `${channel} socket`,
    given: `${address} cannot be bound (${why})`,
    expected: "a free address of this machine",
    hint: "Restart the kernel from the host, which chooses new ports.",
  });
}

function isAnswered(file: string): Promise<boolean> {
  return new Promise((resolve) => {
    const probe = connect(file);
    const done = (answered: boolean) => {
      probe.destroy();
      resolve(answered);
    };
    probe.once("connect", () => done(true));
    probe.once("error", () => done(false));
  });
}
