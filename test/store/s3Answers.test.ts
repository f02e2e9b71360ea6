import { createServer, type IncomingMessage } from "node:http";
import type { AddressInfo } from "node:net";
import { inspect } from "node:util";
import { beforeAll, describe, expect, it, onTestFinished } from "vitest";
import { S3Store } from "../../lib/store/s3Store.ts";

/** What a scripted S3 answers: status, error code, further headers or body. */
interface Scripted {
  readonly status: number;
  readonly code?: string;
  readonly body?: string;
  readonly headers?: Record<string, string>;
}

/** A store on a server of our own that answers as told: for answers that the real gateway never gives. */
async function scripted(answer: (request: IncomingMessage, count: number) => Scripted) {
  const requests: IncomingMessage[] = [];
  const server = createServer((request, response) => {
    request.resume().once("end", () => {
      requests.push(request);
      const { status, code, body, headers } = answer(request, requests.length);
      const error = `<?xml version="1.0"?><Error><Code>${code}</Code><Message>${code} it is</Message>${body ?? ""}</Error>`;
      response.writeHead(status, { "content-type": "application/xml", ...headers });
      response.end(code === undefined ? body : error);
    });
  });
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  onTestFinished(() => void server.close());
  const endpoint = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  return { store: new S3Store("bucket", "prefix", { endpoint }), requests };
}

const listing = (...keys: string[]) =>
  `<?xml version="1.0"?><ListBucketResult><IsTruncated>false</IsTruncated>${keys
    .map((key) => `<Contents><Key>prefix/${key}</Key><Size>1</Size><ETag>"e"</ETag></Contents>`)
    .join("")}</ListBucketResult>`;
const isList = (request: IncomingMessage) => request.url!.includes("list-type=2");

describe("answers of S3", () => {
  beforeAll(() => {
    process.env.AWS_ACCESS_KEY_ID ??= "AKHUSHHUSH";
    process.env.AWS_SECRET_ACCESS_KEY ??= "secrethushhush";
  });

  it("a create that meets another under way (409) is sent again until it is decided", async () => {
    const conflict = { status: 409, code: "ConditionalRequestConflict" };
    const taken = { status: 412, code: "PreconditionFailed" };
    const won = await scripted((_, count) => (count <= 2 ? conflict : count === 3 ? { status: 200 } : taken));
    expect(await won.store.create("a.json", Buffer.from("a"))).toBe("created");
    // The fourth tries whether the server honours conditions.
    expect(won.requests).toHaveLength(4);
    const lost = await scripted((_, count) => (count <= 2 ? conflict : taken));
    expect(await lost.store.create("a.json", Buffer.from("a"))).toBe("exists");
    const never = await scripted(() => conflict);
    await expect(never.store.create("a.json", Buffer.from("a"))).rejects.toThrow(
      "ConditionalRequestConflict (409)",
    );
  });

  it("a create asks for nothing but that the key be free, and carries its mark and media type", async () => {
    const { store, requests } = await scripted((_, count) =>
      count === 2 ? { status: 412, code: "PreconditionFailed" } : { status: 200 },
    );
    await store.create("forecasts/a/latest.csv", Buffer.from("a"));
    await store.create("report.html", Buffer.from("a"));
    // The second tries whether the server honours conditions.
    expect(requests).toHaveLength(3);
    const [first, , last] = requests.map(({ headers }) => headers);
    expect(first).toMatchObject({ "if-none-match": "*", "content-type": "text/csv; charset=utf-8" });
    expect(last).toMatchObject({ "if-none-match": "*", "content-type": "text/html; charset=utf-8" });
    expect(new Set(requests.map(({ headers }) => headers["x-amz-meta-writer"])).size).toBe(3);
  });

  it("a server that takes no notice of conditions is found out at the first create, and said so", async () => {
    const { store } = await scripted(() => ({ status: 200 }));
    await expect(store.create("a.json", Buffer.from("a"))).rejects.toThrow(
      'could not create "a.json" in s3://bucket/prefix: this server takes no notice of If-None-Match',
    );
  });

  it("a trial of conditions that fails itself is repeated at the next create", async () => {
    const answers = [200, 400, 200, 412, 200];
    const { store, requests } = await scripted((_, count) =>
      answers[count - 1] === 200 ? { status: 200 } : { status: answers[count - 1]!, code: "Other" },
    );
    for (const key of ["a", "b", "c"]) expect(await store.create(key, Buffer.from("a"))).toBe("created");
    expect(requests).toHaveLength(5);
  });

  it("a trial that meets another write under way (409) shows that conditions are honoured", async () => {
    const { store, requests } = await scripted((_, count) =>
      count === 2 ? { status: 409, code: "ConditionalRequestConflict" } : { status: 200 },
    );
    for (const key of ["a", "b", "c"]) await store.create(key, Buffer.from("a"));
    expect(requests).toHaveLength(4);
  });

  it("without a retry a 412 is another's object and is not asked after", async () => {
    const { store, requests } = await scripted(() => ({ status: 412, code: "PreconditionFailed" }));
    expect(await store.create("a.json", Buffer.from("a"))).toBe("exists");
    expect(requests).toHaveLength(1);
  });

  it("403 for a key that a listing shows to be absent is absence (no s3:ListBucket without its prefix)", async () => {
    const { store } = await scripted((request) =>
      isList(request)
        ? { status: 200, body: listing("settings.json.bak") }
        : { status: 403, code: "AccessDenied" },
    );
    expect(await store.read("settings.json")).toBeUndefined();
    expect(await store.stream("settings.json")).toBeUndefined();
  });

  it("403 for a key that a listing shows is a fault", async () => {
    const { store } = await scripted((request) =>
      isList(request)
        ? { status: 200, body: listing("settings.json") }
        : { status: 403, code: "AccessDenied" },
    );
    await expect(store.read("settings.json")).rejects.toThrow(
      'could not read "settings.json" in s3://bucket/prefix: AccessDenied (403)',
    );
  });

  it("403 for a key and its listing says which right is missing to tell", async () => {
    const { store } = await scripted(() => ({ status: 403, code: "AccessDenied" }));
    await expect(store.read("settings.json")).rejects.toThrow(
      "cannot be told without s3:ListBucket for this key",
    );
    await expect(store.list("series/")).rejects.toThrow(
      'could not list "series/" in s3://bucket/prefix: AccessDenied',
    );
    await expect(store.create("a", Buffer.from(""))).rejects.toThrow(
      'could not create "a" in s3://bucket/prefix: AccessDenied',
    );
  });

  it("a listing that breaks off is an error, never a shorter listing", async () => {
    const body = listing("a").replace("false", "true");
    const { store } = await scripted(() => ({ status: 200, body }));
    await expect(store.list("")).rejects.toThrow("the listing broke off");
    const later = await scripted((_, count) =>
      count === 1
        ? {
            status: 200,
            body: body
              .replace("</Is", "</Is")
              .replace("<Contents>", "<NextContinuationToken>t</NextContinuationToken><Contents>"),
          }
        : { status: 400, code: "InvalidRequest" },
    );
    await expect(later.store.list("")).rejects.toThrow("InvalidRequest (400)");
  });

  it("a listing's keys are read as S3 writes them: a space as +, a plus as %2B", async () => {
    const { store } = await scripted(() => ({ status: 200, body: listing("a+b%2Bc%26%E2%82%AC.csv") }));
    expect((await store.list("")).map(({ key }) => key)).toEqual(["a b+c&€.csv"]);
  });

  it("of a server's long explanation the first line is told, up to 300 characters", async () => {
    const { store } = await scripted(() => ({
      status: 400,
      code: `Odd\u009b31m${"y".repeat(400)}\nsecond line`,
    }));
    const error = await store.read("a.json").catch((found: unknown) => found as Error);
    expect(String(error)).toContain("Odd 31myyy");
    expect(String(error)).not.toContain("second line");
  });

  it("a missing bucket is a fault that says so, not an absent object", async () => {
    const { store } = await scripted(() => ({ status: 404, code: "NoSuchBucket" }));
    await expect(store.read("settings.json")).rejects.toThrow("NoSuchBucket (404): there is no such bucket");
  });

  it("a server's talkative refusal leaks neither key nor signature, however the error is printed", async () => {
    const { store } = await scripted((request) => ({
      status: 403,
      code: "SignatureDoesNotMatch",
      body: `<AWSAccessKeyId>AKHUSHHUSH</AWSAccessKeyId><StringToSign>hushhush</StringToSign><SignatureProvided>${request.headers.authorization?.slice(-20)}hushhush</SignatureProvided>`,
    }));
    const error = await store.read("a.json").catch((found: unknown) => found);
    const printed = inspect(error, { depth: 20, showHidden: true });
    expect(printed).toContain("the server refused the signature");
    expect(printed).not.toMatch(/hushhush|AKHUSH/i);
  });
});
