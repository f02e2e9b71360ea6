import { execFile } from "node:child_process";
import { writeFile } from "node:fs/promises";
import { join } from "node:path";
import { promisify } from "node:util";
import { describe, expect, it } from "vitest";
import { FolderStore } from "../../lib/store/folderStore.ts";
import { openStore } from "../../lib/store/openStore.ts";
import { S3Store } from "../../lib/store/s3Store.ts";
import { bundle } from "../support/bundle.ts";
import { cephBucket, gateway, hasGateway } from "../support/cephStore.ts";
import { temporaryFolder } from "../support/temporaryFolder.ts";

describe("openStore", () => {
  it("opens a folder by any path and a bucket by s3://bucket/prefix", () => {
    for (const path of ["./store", "store", "/var/store", "C:\\store", "../up", "with space"]) {
      expect(openStore(path, {})).toBeInstanceOf(FolderStore);
      expect(openStore(path, {}).address).toBe(path);
    }
    for (const [address, named] of [
      ["s3://my-bucket", "s3://my-bucket"],
      ["s3://my-bucket/", "s3://my-bucket"],
      ["s3://my.bucket/a/b/", "s3://my.bucket/a/b"],
      ["S3://my-bucket/a", "s3://my-bucket/a"],
    ] as const) {
      expect(openStore(address, {})).toBeInstanceOf(S3Store);
      expect(openStore(address, {}).address).toBe(named);
    }
  });

  it("refuses what is no store, and repeats nothing that may be a secret", () => {
    const refused = [
      "",
      " ",
      "a\0b",
      "s3://",
      "s3:///prefix",
      "s3://UPPER/x",
      "s3://ab",
      "s3://b_c/x",
      "s3://my-bucket/../x",
      "s3://my-bucket/a//b",
    ];
    for (const address of refused) expect(() => openStore(address, {}), address).toThrow(TypeError);
    for (const address of ["https://example.com/x", "gs://bucket", "file:///tmp"]) {
      expect(() => openStore(address, {})).toThrow(
        "openStore knows folder paths and s3://bucket/prefix, not ",
      );
    }
    for (const address of ["s3://AKIAKEY:hushhush@bucket/x", "s3://hushhush@b"]) {
      expect(() => openStore(address, {})).toThrow(/^(?!.*hushhush)/);
    }
    expect(() => openStore(7 as unknown as string, {})).toThrow(TypeError);
  });

  it("uses a folder without the S3 client being installed", async () => {
    const folder = await temporaryFolder();
    await writeFile(
      join(folder, "entry.ts"),
      `import { openStore } from ${JSON.stringify(join(process.cwd(), "lib/store/openStore.ts"))};
       const store = openStore("./store");
       await store.create("a.csv", Buffer.from("a"));
       console.log((await store.list("")).length, await import("@aws-sdk/client-s3").catch((error) => error.code));`,
    );
    const program = await bundle(join(folder, "entry.ts"), folder);
    const { stdout } = await promisify(execFile)(process.execPath, [program], { cwd: folder });
    expect(stdout.trim()).toBe("1 ERR_MODULE_NOT_FOUND");
  });

  it.skipIf(!hasGateway)(
    "speaks to the server that AWS_ENDPOINT_URL_S3, or else AWS_ENDPOINT_URL, names",
    async () => {
      const { endpoint } = await gateway();
      const bucket = await cephBucket();
      const nowhere = "http://127.0.0.1:1";
      const first = openStore(`s3://${bucket}/x`, {
        AWS_ENDPOINT_URL_S3: endpoint,
        AWS_ENDPOINT_URL: nowhere,
      });
      expect(await first.create("a.csv", Buffer.from("a"))).toBe("created");
      const second = openStore(`s3://${bucket}`, { AWS_ENDPOINT_URL: endpoint });
      expect((await second.list("")).map(({ key }) => key)).toEqual(["x/a.csv"]);
    },
  );
});
