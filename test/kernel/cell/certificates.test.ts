// Certificates of the site pass the kernel by and reach the cells.
import { expect, it } from "vitest";
import {
  CERTIFICATES_ASIDE,
  certificatesAside,
  withCertificates,
  withoutCertificates,
} from "../../../kernel/cell/certificates.ts";

const SITE = { PATH: "/bin", NODE_EXTRA_CA_CERTS: "/etc/site.pem" };

it("the cells get what the host had, the other processes nothing — oracle: the environments by hand", () => {
  const kernel = { ...SITE, ...certificatesAside(SITE) };
  expect(kernel.NODE_EXTRA_CA_CERTS).toBe("");
  expect(withCertificates(kernel)).toEqual(SITE);
  expect(withoutCertificates(kernel)).toEqual({ PATH: "/bin" });
});

it("the placeholder of a kernelspec is no file — oracle: a host without the variable, as safe_substitute leaves it", () => {
  expect(withCertificates({ PATH: "/bin", ...CERTIFICATES_ASIDE })).toEqual({ PATH: "/bin" });
});

it("a variable that was set for the kernel itself stays — oracle: the environment by hand", () => {
  expect(withCertificates({ ...CERTIFICATES_ASIDE, ...SITE })).toEqual(SITE);
  expect(withCertificates(SITE)).toEqual(SITE);
});
