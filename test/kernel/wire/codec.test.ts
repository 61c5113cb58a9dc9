import { createHmac } from "node:crypto";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { createEncoder, decode } from "../../../kernel/wire/codec.ts";
import { createSigner } from "../../../kernel/wire/signer.ts";

const KEY = "a-key";
const frame = (text: string) => Buffer.from(text, "utf8");
const DELIMITER = frame("<IDS|MSG>");
const sign = (parts: readonly Buffer[], hash = "sha256", key = KEY) =>
  frame(createHmac(hash, key).update(Buffer.concat(parts)).digest("hex"));
const signer = () => createSigner("sha256", KEY);
const HEADER = '{"msg_id":"1","msg_type":"kernel_info_request"}';

function message(parts: readonly string[], before: readonly Buffer[] = [], after: readonly Buffer[] = []): Buffer[] {
  const frames = parts.map(frame);
  return [...before, DELIMITER, sign(frames), ...frames, ...after];
}

const fault = (frames: readonly Buffer[], by = signer()) => {
  const decoded = decode(frames, by);
  return "fault" in decoded ? decoded.fault : undefined;
};

describe("decode", () => {
  it("keeps identities, header bytes and buffers as they came — oracle: the frames put in", () => {
    const identities = [Buffer.from([0, 255]), Buffer.alloc(0), frame("x")];
    const odd = '{"msg_type" : "a", "n": 12345678901234567890}';
    const buffers = [Buffer.from([1]), DELIMITER, Buffer.alloc(0)];
    const decoded = decode(message([odd, '{"p":1}', "{}", '{"c":"ü"}'], identities, buffers), signer());
    expect(decoded).toEqual({
      message: {
        identities,
        header: { msg_type: "a", n: JSON.parse("12345678901234567890") },
        headerBytes: frame(odd),
        parentHeader: { p: 1 },
        metadata: {},
        content: { c: "ü" },
        buffers,
      },
    });
  });

  it("takes the first delimiter — oracle: protocol", () => {
    const frames = message([HEADER, "{}", "{}", "{}"], [], [DELIMITER]);
    expect(decode(frames, signer())).toMatchObject({ message: { identities: [], buffers: [DELIMITER] } });
  });

  it.each([
    ["nothing", [], "no delimiter frame"],
    ["no delimiter", [frame("a"), frame("b")], "no delimiter frame"],
    ["the delimiter alone", [DELIMITER], "too few frames"],
    ["three parts", [DELIMITER, frame(""), ...["{}", "{}", "{}"].map(frame)], "too few frames"],
    ["an empty signature", [DELIMITER, frame(""), ...[HEADER, "{}", "{}", "{}"].map(frame)], "wrong signature"],
    ["null as content", message([HEADER, "{}", "{}", "null"]), "a part that is no JSON object"],
    ["a list as header", message(["[]", "{}", "{}", "{}"]), "a part that is no JSON object"],
    ["broken JSON", message([HEADER, "{", "{}", "{}"]), "a part that is no JSON object"],
    ["no type", message(["{}", "{}", "{}", "{}"]), "a header without msg_type"],
    ["a number as type", message(['{"msg_type":4}', "{}", "{}", "{}"]), "a header without msg_type"],
  ])("%s is a fault — oracle: the fault put in", (_name, frames, words) => {
    expect(fault(frames)).toBe(words);
  });

  it("refuses bytes that are no UTF-8 — oracle: RFC 3629, an overlong and a lone byte", () => {
    for (const bytes of [[0xc0, 0x80], [0xff], [0xed, 0xa0, 0x80]]) {
      const parts = [
        frame(HEADER),
        frame("{}"),
        frame("{}"),
        Buffer.from([0x7b, 0x22, ...bytes, 0x22, 0x3a, 0x31, 0x7d]),
      ];
      expect(fault([DELIMITER, sign(parts), ...parts])).toBe("a part that is no JSON object");
    }
  });

  it("answers to JSON nested a million deep — oracle: no throw, the type is still there or the fault is named", () => {
    const deep = `{"a":${"[".repeat(1e6)}${"]".repeat(1e6)}}`;
    expect([undefined, "a part that is no JSON object"]).toContain(fault(message([HEADER, "{}", "{}", deep])));
  });

  it("works once a message: a replay is a fault, and so is a changed byte — oracle: HMAC", () => {
    const by = signer();
    const frames = message([HEADER, "{}", "{}", "{}"]);
    expect(fault(frames, by)).toBeUndefined();
    expect(fault(frames, by)).toBe("a message seen before");
    const changed = [...frames.slice(0, -1), frame("{} ")];
    expect(fault(changed, by)).toBe("wrong signature");
  });

  it("never throws and never accepts frames without the key — oracle: random frames around a valid message", () => {
    const bytes = fc.uint8Array({ maxLength: 40 }).map((array) => Buffer.from(array));
    const part = fc.oneof(bytes, fc.constantFrom(DELIMITER, frame("{}"), frame(HEADER)), fc.json().map(frame));
    fc.assert(
      fc.property(fc.array(part, { maxLength: 9 }), (frames) => {
        expect(fault(frames)).toBeDefined();
      }),
      { numRuns: 2000, seed: 20 },
    );
  });

  it("with an empty key every JSON is data: no throw, and any type string passes — oracle: JSON.parse", () => {
    fc.assert(
      fc.property(fc.array(fc.json(), { minLength: 4, maxLength: 4 }), fc.string(), (parts, type) => {
        const header = JSON.stringify({ msg_type: type });
        const frames = [DELIMITER, frame(""), frame(header), ...parts.slice(1).map(frame)];
        const objects = parts.slice(1).every((text) => /^\s*\{/.test(text));
        expect(fault(frames, createSigner("sha256", ""))).toBe(objects ? undefined : "a part that is no JSON object");
      }),
      { numRuns: 500, seed: 21 },
    );
  });
});

describe("signer", () => {
  it.each(["sha256", "sha512", "md5"])(
    "hmac-%s over the frames in order — oracle: node:crypto in one piece",
    (hash) => {
      const parts = ["{}", '{"a":"ü"}'].map(frame);
      const by = createSigner(hash, "ключ");
      expect(frame(by.sign(parts))).toEqual(sign(parts, hash, "ключ"));
      expect(by.matches(sign(parts, hash, "ключ"), parts)).toBe(true);
      expect(by.matches(frame(by.sign(parts).toUpperCase()), parts)).toBe(false);
    },
  );

  it("HMAC-SHA256 test case 2 — oracle: RFC 4231", () => {
    const by = createSigner("sha256", "Jefe");
    expect(by.sign([frame("what do ya want "), frame("for nothing?")])).toBe(
      "5bdcc146bf60754e6a042426089575c75a003f089d2739839dec58b964ec3843",
    );
  });

  it("remembers a bounded number of signatures, the latest — oracle: the order of use", () => {
    const by = createSigner("sha256", KEY, 3);
    const use = (n: number) => by.firstUse(frame(`s${n}`));
    expect([1, 2, 3, 4].map(use)).toEqual([true, true, true, true]);
    expect(use(4)).toBe(false);
    expect(use(2)).toBe(false);
    expect(use(1)).toBe(true);
  });
});

describe("encoder", () => {
  it("signs the bytes it sends, and what it sends is UTF-8 JSON even with a lone surrogate — oracle: own HMAC", () => {
    const { encode } = createEncoder(signer(), "me");
    const content = { text: "\ud83d and \u2028 é" };
    const { frames } = encode([frame("id")], { type: "stream", content, parent: { headerBytes: frame(HEADER) } });
    const [identity, delimiter, signature, ...parts] = frames as [Buffer, Buffer, Buffer, ...Buffer[]];
    expect([identity, delimiter]).toEqual([frame("id"), DELIMITER]);
    expect(signature).toEqual(sign(parts));
    expect(parts[1]).toEqual(frame(HEADER));
    const strict = new TextDecoder("utf-8", { fatal: true });
    expect(JSON.parse(strict.decode(parts[3]))).toEqual(content);
  });
});
