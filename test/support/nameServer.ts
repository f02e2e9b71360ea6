import { createSocket } from "node:dgram";
import { Resolver } from "node:dns/promises";
import { onTestFinished } from "vitest";
import type { Resolve } from "../../lib/webhook/guardedLookup.ts";

/** A DNS server on loopback that answers as told, and a resolver that asks it. */
export interface NameServer {
  readonly resolve: Resolve;
  /** Names asked for, in order. */
  readonly asked: string[];
}

/**
 * Answers each question for an address (A, no waiting time) with what `answer` says: IPv4 addresses, none for an
 * empty answer. `count` is 1 for the first question.
 */
export async function nameServer(
  answer: (name: string, count: number) => readonly string[],
): Promise<NameServer> {
  const asked: string[] = [];
  const socket = createSocket("udp4");
  socket.on("message", (question, from) => {
    const name = nameIn(question);
    asked.push(name);
    socket.send(reply(question, answer(name, asked.length)), from.port, from.address);
  });
  await new Promise<void>((resolve) => socket.bind(0, "127.0.0.1", resolve));
  onTestFinished(() => void socket.close());
  const resolver = new Resolver({ timeout: 2_000, tries: 1 });
  resolver.setServers([`127.0.0.1:${socket.address().port}`]);
  const resolve: Resolve = async (host) =>
    (await resolver.resolve4(host)).map((address) => ({ address, family: 4 }));
  return { resolve, asked };
}

/** The name in a DNS question: after the 12 bytes of the header, a length before each part. */
function nameIn(question: Buffer): string {
  const parts: string[] = [];
  for (let at = 12; question[at]! > 0; at += question[at]! + 1) {
    parts.push(question.toString("ascii", at + 1, at + 1 + question[at]!));
  }
  return parts.join(".");
}

/** RFC 1035: the question repeated, then a record an address that points back to its name. */
function reply(question: Buffer, addresses: readonly string[]): Buffer {
  const end = question.indexOf(0, 12) + 5;
  const head = Buffer.from(question.subarray(0, end));
  head.writeUInt16BE(0x8180, 2);
  head.writeUInt16BE(1, 4);
  head.writeUInt16BE(addresses.length, 6);
  head.writeUInt32BE(0, 8);
  const records = addresses.map((address) =>
    Buffer.from([0xc0, 12, 0, 1, 0, 1, 0, 0, 0, 0, 0, 4, ...address.split(".").map(Number)]),
  );
  return Buffer.concat([head, ...records]);
}
