import { createHmac } from "node:crypto";
import { describe, expect, it } from "vitest";
import { signatureHeaders } from "../../lib/webhook/signatureHeaders.ts";

// The check value of the reference libraries' own tests (Standard Webhooks 1.0.0, libraries/javascript).
const check = {
  id: "msg_p5jXN8AQM9LWM0D4loKWxJek",
  timestamp: 1614265330,
  body: '{"test": 2432232314}',
  keys: ["whsec_MfKQ9r8GKYqrTwjUPD8ILPZIo2LaLaSw"],
};
const checkSignature = "v1,g0hM9SsE+OTPJTGt/tmIKtSyZlE3uFJELVlNIOLJ1OE=";

describe("signatureHeaders", () => {
  it("gives the reference libraries' check value", () => {
    expect(signatureHeaders(check)).toEqual({
      "webhook-id": "msg_p5jXN8AQM9LWM0D4loKWxJek",
      "webhook-timestamp": "1614265330",
      "webhook-signature": checkSignature,
    });
  });

  it("takes a key with or without its whsec_ mark, as the reference libraries do", () => {
    const bare = check.keys.map((key) => key.replace("whsec_", ""));
    expect(signatureHeaders({ ...check, keys: bare })["webhook-signature"]).toBe(checkSignature);
  });

  it("signs with every key while keys are changed over, in the order given", () => {
    const next = `whsec_${Buffer.alloc(32, 7).toString("base64")}`;
    const signatures = signatureHeaders({ ...check, keys: [next, ...check.keys] })[
      "webhook-signature"
    ]!.split(" ");
    const own = createHmac("sha256", Buffer.alloc(32, 7)).update(
      `${check.id}.${check.timestamp}.${check.body}`,
    );
    expect(signatures).toEqual([`v1,${own.digest("base64")}`, checkSignature]);
  });

  it("signs the bytes of the body: text beyond ASCII as UTF-8", () => {
    const body = '{"text":"Käse 🧀"}';
    const signed = Buffer.concat([Buffer.from(`${check.id}.${check.timestamp}.`), Buffer.from(body, "utf8")]);
    const expected = createHmac("sha256", Buffer.from("MfKQ9r8GKYqrTwjUPD8ILPZIo2LaLaSw", "base64")).update(
      signed,
    );
    expect(signatureHeaders({ ...check, body })["webhook-signature"]).toBe(`v1,${expected.digest("base64")}`);
  });

  it("leaves the signature out, and nothing else, when there is no key", () => {
    expect(Object.keys(signatureHeaders({ ...check, keys: [] }))).toEqual([
      "webhook-id",
      "webhook-timestamp",
    ]);
  });

  it("refuses unsound keys, ids and timestamps, and never repeats a key", () => {
    const refused = [
      "whsec_",
      "whsec_short",
      "whsec_not base64 at all, but long enough",
      "sk_live_secret",
      "",
    ];
    for (const size of [23, 65]) refused.push(`whsec_${Buffer.alloc(size, 7).toString("base64")}`);
    for (const key of refused) {
      expect(() => signatureHeaders({ ...check, keys: [key] }), key).toThrow(
        "a signing key needs to be whsec_ and 24 to 64 bytes in base64",
      );
    }
    for (const id of ["", "a.b", "a b", "a\r\nx: y"])
      expect(() => signatureHeaders({ ...check, id })).toThrow(TypeError);
    for (const timestamp of [1.5, -1, Number.NaN]) {
      expect(() => signatureHeaders({ ...check, timestamp })).toThrow(TypeError);
    }
  });
});
