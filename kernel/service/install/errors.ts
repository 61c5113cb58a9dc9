import { LibraryError } from "../../../lib/proof/errors.ts";

/** An installation that cannot be made, repaired or taken away; the message is for the person at the terminal. */
export class InstallError extends LibraryError {}
