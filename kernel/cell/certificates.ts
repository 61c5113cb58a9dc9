// Certificates that a site adds for all programs of Node (NODE_EXTRA_CA_CERTS). Node 20 reads them before it runs a line,
// in every process: 70 ms for a system's whole bundle. The kernel and the type checker speak to nobody by TLS, so they
// start without; the cells may fetch something, so they get the variable as the host had it.

const NODE = "NODE_EXTRA_CA_CERTS";
/** Carries the value past the kernel. */
const ASIDE = "HALFPERIOD_CERTIFICATES";

type Environment = Readonly<Record<string, string | undefined>>;

/** For a kernelspec: the host fills in the value of its own variable. */
export const CERTIFICATES_ASIDE: Readonly<Record<string, string>> = { [NODE]: "", [ASIDE]: `\${${NODE}}` };

/** The same, filled in. */
export function certificatesAside(env: Environment): Readonly<Record<string, string>> {
  return { [NODE]: "", [ASIDE]: certificates(env) };
}

/** The environment for a process that needs no certificates. */
export function withoutCertificates({ [NODE]: _, [ASIDE]: __, ...env }: Environment): Environment {
  return env;
}

/** The environment as the host had it. */
export function withCertificates(env: Environment): Environment {
  const value = certificates(env);
  return { ...withoutCertificates(env), ...(value !== "" && { [NODE]: value }) };
}

/** A host that fills nothing in, or has no such variable, leaves the placeholder. */
function certificates(env: Environment): string {
  const aside = env[ASIDE] ?? "";
  return env[NODE] || (aside.startsWith("${") ? "" : aside);
}
