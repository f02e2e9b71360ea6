import { describe } from "vitest";
import { cephStore, hasGateway } from "../support/cephStore.ts";
import { storeContract } from "./contract.ts";

describe.skipIf(!hasGateway)("against Ceph's S3 gateway", () => {
  storeContract("a bucket", async () => (await cephStore(""))!);
  storeContract("a bucket's prefix", async () => (await cephStore("some/prefix/"))!);
});
