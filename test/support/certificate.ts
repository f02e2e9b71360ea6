import { generateKeyPairSync, sign } from "node:crypto";
import type { Identity } from "./receiver.ts";

/**
 * A key and a self-signed certificate for a host name, valid from 2020 to 2049: X.509 version 3 (RFC 5280) written
 * out in DER, with the name as subject, issuer and alternative name.
 */
export function selfSigned(host: string): Identity {
  const { privateKey, publicKey } = generateKeyPairSync("ec", { namedCurve: "prime256v1" });
  const algorithm = sequence(objectId("1.2.840.10045.4.3.2")); // ecdsa-with-SHA256
  const name = sequence(tagged(0x31, sequence(objectId("2.5.4.3"), tagged(0x0c, Buffer.from(host)))));
  const validity = sequence(
    ...["200101000000Z", "491231235959Z"].map((time) => tagged(0x17, Buffer.from(time))),
  );
  const alternativeName = sequence(
    objectId("2.5.29.17"),
    tagged(0x04, sequence(tagged(0x82, Buffer.from(host)))),
  );
  const toSign = sequence(
    tagged(0xa0, tagged(0x02, Buffer.from([2]))),
    tagged(0x02, Buffer.from([1])),
    algorithm,
    name,
    validity,
    name,
    publicKey.export({ type: "spki", format: "der" }),
    tagged(0xa3, sequence(alternativeName)),
  );
  const signature = sign("sha256", toSign, privateKey);
  const certificate = sequence(toSign, algorithm, tagged(0x03, Buffer.concat([Buffer.from([0]), signature])));
  const lines = certificate.toString("base64").match(/.{1,64}/g)!;
  return {
    key: privateKey.export({ type: "pkcs8", format: "pem" }).toString(),
    cert: `-----BEGIN CERTIFICATE-----\n${lines.join("\n")}\n-----END CERTIFICATE-----\n`,
  };
}

function tagged(tag: number, ...contents: Buffer[]): Buffer {
  const content = Buffer.concat(contents);
  const size = content.length;
  const length = size < 128 ? [size] : size < 256 ? [0x81, size] : [0x82, size >> 8, size & 255];
  return Buffer.concat([Buffer.from([tag, ...length]), content]);
}

function sequence(...contents: Buffer[]): Buffer {
  return tagged(0x30, ...contents);
}

function objectId(dotted: string): Buffer {
  const [first, second, ...rest] = dotted.split(".").map(Number);
  const bytes = rest.flatMap((part) => {
    const groups = [part & 127];
    for (let high = part >> 7; high > 0; high >>= 7) groups.unshift((high & 127) | 128);
    return groups;
  });
  return tagged(0x06, Buffer.from([first! * 40 + second!, ...bytes]));
}
