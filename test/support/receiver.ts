import { createServer, type IncomingMessage, type Server, type ServerResponse } from "node:http";
import { createServer as createSecureServer } from "node:https";
import type { AddressInfo } from "node:net";
import { onTestFinished } from "vitest";
import { canary } from "./canary.ts";

/** One post as it arrived. */
export interface Received {
  readonly path: string;
  readonly headers: IncomingMessage["headers"];
  readonly body: string;
}

/** A webhook's receiving end on loopback, with all it received. */
export interface Receiver {
  readonly address: string;
  readonly port: number;
  readonly received: Received[];
}

/** Answers one post; `count` is 1 for the first. */
export type Answer = (response: ServerResponse, count: number, request: IncomingMessage) => void;

/** Key and certificate (PEM) for an https receiver. */
export interface Identity {
  readonly key: string;
  readonly cert: string;
}

/**
 * Starts a real HTTP (or, with an identity, HTTPS) server that ends with the test, or when `atEnd` says. Answers 200
 * by default.
 */
export async function receiver(
  answer: Answer = (response) => response.writeHead(200).end("ok"),
  identity?: Identity,
  atEnd: (work: () => void) => void = onTestFinished,
): Promise<Receiver> {
  const received: Received[] = [];
  const listener = (request: IncomingMessage, response: ServerResponse) => {
    const pieces: Buffer[] = [];
    request.on("data", (piece: Buffer) => pieces.push(piece));
    request.on("error", () => undefined);
    response.on("error", () => undefined);
    request.on("end", () => {
      received.push({
        path: request.url ?? "",
        headers: request.headers,
        body: Buffer.concat(pieces).toString(),
      });
      answer(response, received.length, request);
    });
  };
  const server: Server = identity ? createSecureServer(identity, listener) : createServer(listener);
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  atEnd(() => {
    server.close();
    server.closeAllConnections();
  });
  const { port } = server.address() as AddressInfo;
  return { address: `${identity ? "https" : "http"}://localhost:${port}${canary.path}`, port, received };
}
