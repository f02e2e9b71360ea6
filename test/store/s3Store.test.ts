import { HeadObjectCommand } from "@aws-sdk/client-s3";
import { describe, expect, it } from "vitest";
import { S3Store } from "../../lib/store/s3Store.ts";
import { cephBucket, cephStore, gateway, hasGateway, rawClient } from "../support/cephStore.ts";
import { storeContract } from "./contract.ts";

describe.skipIf(!hasGateway)("against Ceph's S3 gateway", () => {
  storeContract("a bucket", async () => (await cephStore(""))!);
  storeContract("a bucket's prefix", async () => (await cephStore("some/prefix/"))!);

  it("a listing of more than two pages (S3 gives a thousand keys a page) is complete and ordered", async () => {
    const store = (await cephStore("many"))!;
    const keys = Array.from({ length: 2_203 }, (_, i) => `models/${i % 7}/${i}.json`);
    const waiting = [...keys];
    const worker = async () => {
      for (let key = waiting.pop(); key; key = waiting.pop()) await store.create(key, new Uint8Array());
    };
    await Promise.all(Array.from({ length: 24 }, worker));
    expect((await store.list("")).map(({ key }) => key)).toEqual(keys.sort());
    expect(await store.list("models/3/")).toHaveLength(
      keys.filter((key) => key.startsWith("models/3/")).length,
    );
  });

  it("a prefix keeps to itself: neighbours whose names begin alike are not seen", async () => {
    const bucket = await cephBucket();
    const { endpoint } = await gateway();
    const at = (prefix: string) => new S3Store(bucket, prefix, { endpoint });
    for (const prefix of ["", "a", "a/b", "ab"]) await at(prefix).write("x.csv", Buffer.from(prefix));
    const seen = async (prefix: string) => (await at(prefix).list("")).map(({ key }) => key);
    expect(await seen("a")).toEqual(["b/x.csv", "x.csv"]);
    expect(await seen("a/b")).toEqual(["x.csv"]);
    expect(await seen("ab")).toEqual(["x.csv"]);
    expect(await seen("")).toEqual(["a/b/x.csv", "a/x.csv", "ab/x.csv", "x.csv"]);
  });

  it("objects carry the media type that a browser needs", async () => {
    const bucket = await cephBucket();
    const store = new S3Store(bucket, "", { endpoint: (await gateway()).endpoint });
    await store.write("runs/a/report.html", Buffer.from("<p>"));
    await store.create("runs/a/plan.json", Buffer.from("{}"));
    const client = await rawClient();
    const type = async (key: string) =>
      (await client.send(new HeadObjectCommand({ Bucket: bucket, Key: key }))).ContentType;
    expect(await type("runs/a/report.html")).toBe("text/html; charset=utf-8");
    expect(await type("runs/a/plan.json")).toBe("application/json");
  });

  it("a bucket that is not there is a fault that says so", async () => {
    const store = new S3Store("no-such-bucket-here", "", { endpoint: (await gateway()).endpoint });
    const acts = [
      () => store.list(""),
      () => store.read("a.csv"),
      () => store.create("a.csv", new Uint8Array()),
    ];
    for (const act of acts) {
      await expect(act()).rejects.toThrow(
        /could not \w+ ".*" in s3:\/\/no-such-bucket-here: NoSuchBucket \(404\)/,
      );
    }
  });

  it("a wrong secret is a fault that says so and repeats no key", async () => {
    const { endpoint } = await gateway();
    const before = process.env.AWS_SECRET_ACCESS_KEY;
    process.env.AWS_SECRET_ACCESS_KEY = "wrong-hushhush";
    try {
      const error: unknown = await new S3Store("bucket", "", { endpoint })
        .list("")
        .catch((found: unknown) => found);
      expect(String(error)).toContain("the server refused the signature");
      expect(String(error)).not.toContain("hushhush");
    } finally {
      process.env.AWS_SECRET_ACCESS_KEY = before;
    }
  });
});
