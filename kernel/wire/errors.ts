// Faults of the connection that end the kernel, or the client, with one line that a person can act on.
import { LibraryError } from "../../lib/proof/errors.ts";

/** A connection file, an endpoint or a message that is not what the protocol says. */
export class ProtocolError extends LibraryError {}
