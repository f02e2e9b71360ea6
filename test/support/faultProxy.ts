import { createServer, request as forward, type IncomingMessage, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";

/** What may go wrong with one request. */
export type Fault =
  /** The connection is reset and the server never hears of the request. */
  | "reset-before"
  /** The server carries the request out; the connection is reset instead of its answer. */
  | "reset-after"
  /** 500, not carried out. */
  | "error"
  /** 500, although carried out. */
  | "error-after"
  /** 503 SlowDown, not carried out. */
  | "slow-down"
  /** The answer's body breaks off halfway, its announced length not kept (without a body: a reset). */
  | "truncate"
  /** The answer stops moving halfway (without a body: before it begins), for `stallMilliseconds`. */
  | "stall";

export const faults: readonly Fault[] = [
  "reset-before",
  "reset-after",
  "error",
  "error-after",
  "slow-down",
  "truncate",
  "stall",
];

export interface FaultProxy {
  readonly endpoint: string;
  /** How often each fault was done, and `none`. */
  readonly counts: Record<Fault | "none", number>;
  /** What becomes of each coming request; may be replaced at any time. */
  decide: (request: IncomingMessage) => Fault | undefined;
  stop(): Promise<void>;
}

/** Numbers in [0, 1) from a seed: mulberry32 (Tommy Ettinger, public domain). */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
}

/** Decides at random: each request meets some fault with this probability. */
export function randomFaults(seed: number, share: number, among: readonly Fault[] = faults) {
  const next = seeded(seed);
  return (): Fault | undefined => (next() < share ? among[Math.floor(next() * among.length)] : undefined);
}

/** Stands between an HTTP client and a server on loopback, passes everything on, and does the faults it is told. */
export async function faultProxy(target: string, stallMilliseconds: number): Promise<FaultProxy> {
  const to = new URL(target);
  const counts = Object.fromEntries([...faults, "none"].map((fault) => [fault, 0])) as FaultProxy["counts"];
  const proxy = { counts, decide: (_: IncomingMessage): Fault | undefined => undefined };

  const server = createServer((request, response) => {
    const fault = proxy.decide(request);
    counts[fault ?? "none"]++;
    request.on("error", () => undefined);
    response.on("error", () => undefined);
    if (fault === "reset-before") return void request.socket.destroy();
    if (fault === "error" || fault === "slow-down") {
      request.resume().once("end", () => refuse(response, fault));
      return;
    }
    pass(request, response, fault);
  });

  function pass(request: IncomingMessage, response: ServerResponse, fault: Fault | undefined): void {
    const { method, url, headers } = request;
    const outgoing = forward({ host: to.hostname, port: to.port, method, path: url, headers, agent: false });
    outgoing.on("error", () => request.socket.destroy());
    outgoing.on("response", (answer) => {
      const pieces: Buffer[] = [];
      answer.on("error", () => request.socket.destroy());
      answer.on("data", (piece: Buffer) => pieces.push(piece));
      answer.on("end", () =>
        reply(answer, Buffer.concat(pieces), request, response, fault, stallMilliseconds),
      );
    });
    request.pipe(outgoing);
  }

  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  return Object.assign(proxy, {
    endpoint: `http://127.0.0.1:${(server.address() as AddressInfo).port}`,
    stop: () =>
      new Promise<void>((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      }),
  });
}

/** Hands the server's answer on, or what the fault leaves of it. */
function reply(
  answer: IncomingMessage,
  body: Buffer,
  request: IncomingMessage,
  response: ServerResponse,
  fault: Fault | undefined,
  stallMilliseconds: number,
): void {
  const half = body.length >> 1;
  if (fault === "reset-after" || (fault === "truncate" && half === 0)) return void request.socket.destroy();
  const begin = () => response.writeHead(answer.statusCode ?? 500, answer.rawHeaders);
  if (fault === "error-after") refuse(response, "error");
  else if (fault === undefined) begin().end(body);
  else if (half === 0) setTimeout(() => begin().end(body), stallMilliseconds);
  else {
    begin().write(body.subarray(0, half));
    if (fault === "truncate") setTimeout(() => request.socket.destroy(), 5);
    else setTimeout(() => response.end(body.subarray(half)), stallMilliseconds);
  }
}

function refuse(response: ServerResponse, fault: "error" | "slow-down"): void {
  const [status, code] = fault === "error" ? [500, "InternalError"] : [503, "SlowDown"];
  const body = `<?xml version="1.0"?><Error><Code>${code}</Code><Message>as told</Message></Error>`;
  response.writeHead(status, { "content-type": "application/xml" }).end(body);
}
