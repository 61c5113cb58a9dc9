import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterAll, expect, it } from "vitest";
import { endpoint, parseConnection, readConnection, socketFile } from "../../../kernel/wire/connection.ts";
import { ProtocolError } from "../../../kernel/wire/errors.ts";

const GOOD = {
  transport: "tcp",
  ip: "127.0.0.1",
  shell_port: 50101,
  iopub_port: 50102,
  stdin_port: 50103,
  control_port: 50104,
  hb_port: 50105,
  signature_scheme: "hmac-sha256",
  key: "geheim-äöü",
};
const parse = (change: object) => parseConnection(JSON.stringify({ ...GOOD, ...change }), "run.json");

it("reads a file as hosts write it — oracle: schema of the connection file", () => {
  expect(parse({ kernel_name: "halfperiod", jupyter_session: "/a/b.ipynb", later: [1] })).toEqual({
    transport: "tcp",
    ip: "127.0.0.1",
    ports: { shell: 50101, iopub: 50102, stdin: 50103, control: 50104, hb: 50105 },
    hash: "sha256",
    key: "geheim-äöü",
  });
});

it("takes ports as strings, and has defaults for scheme, key and transport — oracle: schema", () => {
  const { signature_scheme: _1, key: _2, transport: _3, ...rest } = GOOD;
  const read = parseConnection(JSON.stringify({ ...rest, shell_port: "50101" }), "run.json");
  expect(read).toMatchObject({ transport: "tcp", hash: "sha256", key: "", ports: { shell: 50101 } });
});

it("makes the addresses that the protocol names — oracle: protocol, endpoints", () => {
  expect(endpoint(parse({}), "hb")).toBe("tcp://127.0.0.1:50105");
  expect(endpoint(parse({ ip: "::1" }), "shell")).toBe("tcp://[::1]:50101");
  expect(endpoint(parse({ ip: "localhost" }), "shell")).toBe("tcp://127.0.0.1:50101");
  const ipc = parse({
    transport: "ipc",
    ip: "/tmp/k",
    shell_port: 1,
    iopub_port: 2,
    stdin_port: 3,
    control_port: 4,
    hb_port: 5,
  });
  expect(endpoint(ipc, "iopub")).toBe("ipc:///tmp/k-2");
  expect(socketFile(ipc, "iopub")).toBe("/tmp/k-2");
});

it("takes curve keys only as a whole pair — oracle: Z85, 40 characters", () => {
  const key = "Yne@$w-vo<fVvi]a<NY6T1ed:M$fCG*[IaLV{hID";
  expect(parse({ curve_publickey: key, curve_secretkey: key }).curve).toEqual({ publicKey: key, secretKey: key });
  expect(() => parse({ curve_publickey: key })).toThrow(/curve_publickey and curve_secretkey/);
  expect(() => parse({ curve_publickey: key, curve_secretkey: "short" })).toThrow(ProtocolError);
});

it.each([
  ["", /run\.json: it is empty; expected a JSON object\. /],
  ["{", /it is not JSON/],
  ["[1]", /no object/],
  ["null", /no object/],
  [JSON.stringify({ ...GOOD, iopub_port: undefined }), /no "iopub_port"; expected shell, iopub, stdin, control and hb/],
  [JSON.stringify({ ...GOOD, hb_port: 70_000 }), /"hb_port" is 70000/],
  [JSON.stringify({ ...GOOD, hb_port: 1.5 }), /"hb_port" is 1\.5/],
  [JSON.stringify({ ...GOOD, hb_port: null }), /"hb_port" is null/],
  [JSON.stringify({ ...GOOD, hb_port: GOOD.shell_port }), /port 50101 named twice/],
  [JSON.stringify({ ...GOOD, transport: "inproc" }), /transport "inproc"/],
  [JSON.stringify({ ...GOOD, ip: 7 }), /"ip" is 7/],
  [JSON.stringify({ ...GOOD, signature_scheme: "rot13" }), /signature_scheme "rot13"/],
  [JSON.stringify({ ...GOOD, key: 5 }), /a key that is not a string/],
  [JSON.stringify({ ...GOOD, registration_port: 5 }), /registration file/],
])("refuses %j with one line, without the key — oracle: the fault put in", (text, message) => {
  let thrown: unknown;
  try {
    parseConnection(text, "run.json");
  } catch (error) {
    thrown = error;
  }
  expect(thrown).toBeInstanceOf(ProtocolError);
  expect((thrown as Error).message).toMatch(message);
  expect((thrown as Error).message).not.toMatch(/\n|geheim/);
});

const folder = mkdtempSync(path.join(tmpdir(), "halfperiod wire ü "));
afterAll(() => rmSync(folder, { recursive: true }));

it("reads a path with spaces and letters, and names a missing or unreadable one — oracle: the files made here", () => {
  const file = path.join(folder, "kernel 1.json");
  writeFileSync(file, JSON.stringify(GOOD));
  expect(readConnection(file).ports.hb).toBe(50105);
  expect(() => readConnection(path.join(folder, "none"))).toThrow(/no such file/);
  expect(() => readConnection(folder)).toThrow(/cannot be read \(EISDIR\)/);
});
