import type { AddressInfo } from "node:net";
import { createServer } from "node:net";
import { describe, expect, it, onTestFinished } from "vitest";
import { type Delivery, deliver } from "../../lib/webhook/deliver.ts";
import { signatureHeaders } from "../../lib/webhook/signatureHeaders.ts";
import { canary, leaks } from "../support/canary.ts";
import { selfSigned } from "../support/certificate.ts";
import { receiver } from "../support/receiver.ts";

const key = canary.signingKey;

/** Posts to a local receiver with so many milliseconds in all. */
function post(address: string, milliseconds: number, more: Partial<Delivery> = {}) {
  return deliver({
    address,
    body: '{"text":"hello"}',
    contentType: "application/json; charset=utf-8",
    id: "msg_p5jXN8AQM9LWM0D4loKWxJek",
    keys: [key],
    deadlineMilliseconds: Date.now() + milliseconds,
    clock: Date.now,
    allowLocal: true,
    ...more,
  });
}

describe("deliver", () => {
  it.each([200, 201, 202, 204, 299])("is done at %i, after one post", async (status) => {
    const hook = await receiver((response) => response.writeHead(status).end());
    expect(await post(hook.address, 5_000)).toEqual({ delivered: true, posts: 1, status });
    expect(hook.received).toHaveLength(1);
    expect(hook.received[0]).toMatchObject({ path: canary.path, body: '{"text":"hello"}' });
    expect(hook.received[0]!.headers["content-type"]).toBe("application/json; charset=utf-8");
  });

  it.each([301, 302, 303, 307, 308])("never follows a redirect (%i), and says so", async (status) => {
    const elsewhere = await receiver();
    const hook = await receiver((response) =>
      response.writeHead(status, { location: elsewhere.address }).end(),
    );
    const outcome = await post(hook.address, 5_000);
    expect(outcome).toMatchObject({ delivered: false, posts: 1, gone: false });
    expect(outcome).toHaveProperty("reason", expect.stringContaining(`answered ${status}, a redirect`));
    expect(elsewhere.received).toHaveLength(0);
  });

  it.each([404, 410])("stops at %i: the webhook is gone", async (status) => {
    const hook = await receiver((response) => response.writeHead(status).end());
    expect(await post(hook.address, 5_000)).toMatchObject({ delivered: false, posts: 1, gone: true });
  });

  it.each([400, 401, 403, 413, 422])("stops at %i: the same body would be refused again", async (status) => {
    const hook = await receiver((response) => response.writeHead(status).end("no"));
    expect(await post(hook.address, 5_000)).toMatchObject({ delivered: false, posts: 1, gone: false });
  });

  it("tries again after 500 and 503, with the same id and body, signed anew each time", async () => {
    const hook = await receiver((response, count) => response.writeHead([500, 503, 200][count - 1]!).end());
    expect(await post(hook.address, 10_000)).toEqual({ delivered: true, posts: 3, status: 200 });
    for (const { headers, body } of hook.received) {
      const timestamp = Number(headers["webhook-timestamp"]);
      expect(Math.abs(timestamp - Date.now() / 1000)).toBeLessThan(10);
      expect(headers).toMatchObject(
        signatureHeaders({ id: "msg_p5jXN8AQM9LWM0D4loKWxJek", timestamp, body, keys: [key] }),
      );
    }
    expect(hook.received[2]!.headers["webhook-timestamp"]).not.toBe(
      hook.received[0]!.headers["webhook-timestamp"],
    );
  });

  it("waits after 429 as long as Retry-After asks in seconds", async () => {
    const at: number[] = [];
    const hook = await receiver((response, count) => {
      at.push(Date.now());
      response.writeHead(count === 1 ? 429 : 200, { "retry-after": "1" }).end();
    });
    expect(await post(hook.address, 10_000)).toMatchObject({ delivered: true, posts: 2 });
    expect(at[1]! - at[0]!).toBeGreaterThanOrEqual(990);
  });

  it("waits after 429 until the date Retry-After names", async () => {
    let until = 0;
    let second = 0;
    const hook = await receiver((response, count) => {
      if (count === 2) second = Date.now();
      until ||= Math.ceil(Date.now() / 1000) * 1000 + 1000;
      response.writeHead(count === 1 ? 429 : 200, { "retry-after": new Date(until).toUTCString() }).end();
    });
    expect(await post(hook.address, 10_000)).toMatchObject({ delivered: true, posts: 2 });
    expect(second).toBeGreaterThanOrEqual(until - 10);
  });

  it("clamps a Retry-After of a day to the time left, tries once more and gives up in time", async () => {
    const started = Date.now();
    const hook = await receiver((response) => response.writeHead(429, { "retry-after": "86400" }).end());
    const outcome = await post(hook.address, 1_500);
    expect(outcome).toMatchObject({ delivered: false, gone: false });
    expect(hook.received.length).toBeGreaterThanOrEqual(2);
    expect(Date.now() - started).toBeLessThan(2_500);
  });

  it("gives up on a receiver that never answers when the time is over", async () => {
    const started = Date.now();
    const hook = await receiver(() => undefined);
    const outcome = await post(hook.address, 1_200);
    expect(outcome).toMatchObject({ delivered: false, gone: false });
    expect(outcome).toHaveProperty("reason", expect.stringContaining("did not answer"));
    expect(Date.now() - started).toBeLessThan(2_500);
  });

  it("is not held up by a head that drips or by early hints without end", async () => {
    for (const drip of ["X", "HTTP/1.1 103 Early Hints\r\nlink: </x>\r\n\r\n"]) {
      const server = createServer((socket) => {
        socket.on("error", () => undefined);
        socket.once("data", () => {
          socket.write(drip.startsWith("X") ? "HTTP/1.1 200 OK\r\n" : "");
          const timer = setInterval(() => socket.write(drip), 20);
          socket.once("close", () => clearInterval(timer));
        });
      });
      await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
      onTestFinished(() => void server.close());
      const started = Date.now();
      const outcome = await post(`http://127.0.0.1:${(server.address() as AddressInfo).port}/`, 1_000);
      expect(outcome).toMatchObject({ delivered: false });
      expect(Date.now() - started).toBeLessThan(2_500);
    }
  });

  it("is not held up by a name that never resolves or a server that never shakes hands", async () => {
    const silent = createServer((socket) => void socket.on("error", () => undefined));
    await new Promise<void>((resolve) => silent.listen(0, "127.0.0.1", resolve));
    onTestFinished(() => void silent.close());
    const { port } = silent.address() as AddressInfo;
    for (const lookup of [
      () => new Promise<never>(() => undefined),
      async () => [{ address: "127.0.0.1", family: 4 }],
    ]) {
      const started = Date.now();
      expect(await post(`https://localhost:${port}/`, 800, { lookup })).toMatchObject({
        delivered: false,
        gone: false,
      });
      expect(Date.now() - started).toBeLessThan(2_500);
    }
  });

  it("does not post with a key that is none, and does not repeat it", async () => {
    const hook = await receiver();
    const outcome = await post(hook.address, 5_000, { keys: [key, "whsec_mistyped-secret"] });
    expect(outcome).toMatchObject({ delivered: false, posts: 0, gone: false });
    expect(outcome).toHaveProperty("reason", expect.stringMatching(/its signing key is unsound$/));
    expect(hook.received).toHaveLength(0);
  });

  it("tries again when the connection is closed before an answer", async () => {
    const hook = await receiver((response, count) => (count < 3 ? response.destroy() : response.end()));
    expect(await post(hook.address, 10_000)).toEqual({ delivered: true, posts: 3, status: 200 });
  });

  it("counts an answer whose body breaks off or hangs by its status", async () => {
    for (const end of ["destroy", "hang"]) {
      let closed: () => void;
      const ended = new Promise<void>((resolve) => {
        closed = resolve;
      });
      const hook = await receiver((response) => {
        response.once("close", closed);
        response.writeHead(200, { "content-length": "1000" });
        response.write("half");
        if (end === "destroy") setTimeout(() => response.destroy(), 20);
      });
      expect(await post(hook.address, 5_000)).toEqual({ delivered: true, posts: 1, status: 200 });
      // The connection is not kept for the rest of the body.
      await ended;
    }
  });

  it("takes in only the beginning of an answer of a gigabyte", async () => {
    let sent = 0;
    const block = Buffer.alloc(1 << 20);
    let closed: () => void;
    const ended = new Promise<void>((resolve) => {
      closed = resolve;
    });
    const hook = await receiver((response) => {
      response.writeHead(200, { "content-length": String(2 ** 30) });
      response.once("close", closed);
      const pump = () => {
        while (!response.destroyed && sent < 2 ** 30) {
          sent += block.length;
          if (!response.write(block)) return;
        }
      };
      response.on("drain", pump);
      pump();
    });
    expect(await post(hook.address, 5_000)).toMatchObject({ delivered: true, posts: 1 });
    await ended;
    // What loopback's socket buffers hold at most, far below the gigabyte.
    expect(sent).toBeLessThan(2 ** 26);
  });

  it("refuses an answer whose head is endless", async () => {
    const hook = await receiver((response) =>
      response.writeHead(200, { "x-long": "x".repeat(100_000) }).end(),
    );
    expect(await post(hook.address, 1_000)).toMatchObject({ delivered: false });
  });

  it("says that nobody listens, and that a name is unknown", async () => {
    const refused = await post("http://127.0.0.1:1/", 700);
    expect(refused).toHaveProperty("reason", expect.stringContaining("refused the connection"));
    const nowhere = await post("https://hooks.invalid/x", 700, { lookup: async () => [] });
    expect(nowhere).toHaveProperty("reason", expect.stringContaining("the name has no address"));
    const unknown = await post("https://hooks.invalid/x", 700, {
      lookup: async () => Promise.reject(Object.assign(new Error("getaddrinfo"), { code: "ENOTFOUND" })),
    });
    expect(unknown).toHaveProperty(
      "reason",
      expect.stringMatching(/^hooks\.invalid#[0-9a-f]{8} its name is not known/),
    );
  });

  it("posts over https to a host whose certificate it trusts", async () => {
    const identity = selfSigned("localhost");
    const hook = await receiver(undefined, identity);
    const outcome = await post(hook.address, 5_000, { authorities: identity.cert });
    expect(outcome).toEqual({ delivered: true, posts: 1, status: 200 });
  });

  it("refuses a certificate it does not trust or that is another host's, without a second try", async () => {
    const untrusted = await receiver(undefined, selfSigned("localhost"));
    const other = selfSigned("other.example");
    const misnamed = await receiver(undefined, other);
    for (const [hook, authorities] of [
      [untrusted, undefined],
      [misnamed, other.cert],
    ] as const) {
      const outcome = await post(hook.address, 5_000, authorities === undefined ? {} : { authorities });
      expect(outcome).toMatchObject({ delivered: false, posts: 1 });
      expect(outcome).toHaveProperty("reason", expect.stringContaining("certificate is not accepted"));
      expect(hook.received).toHaveLength(0);
    }
  });

  it("names the host and a hash in every reason, never path, query or key", async () => {
    const statuses = [302, 400, 404, 410, 429, 500];
    for (const status of statuses) {
      const hook = await receiver((response) =>
        response.writeHead(status, { location: canary.path, "x-echo": canary.path }).end(canary.path),
      );
      const outcome = JSON.stringify(await post(`${hook.address}?token=querysecret`, 600));
      expect(outcome).toMatch(/"localhost#[0-9a-f]{8} answered \d{3}/);
      expect(leaks(outcome, "querysecret")).toEqual([]);
    }
  });

  it("does nothing after its deadline", async () => {
    const hook = await receiver();
    expect(await post(hook.address, -1)).toMatchObject({ delivered: false, posts: 0 });
    expect(hook.received).toHaveLength(0);
  });
});
