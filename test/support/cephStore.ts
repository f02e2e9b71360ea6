import { CreateBucketCommand, S3Client } from "@aws-sdk/client-s3";
import { inject } from "vitest";
import { S3Store } from "../../lib/store/s3Store.ts";
import type { Gateway } from "./cephGateway.ts";

const door = inject("gatewayDoor");

/** Whether this test run has an S3 gateway; for `describe.skipIf(!hasGateway)`. */
export const hasGateway = door !== null;

let opened: Promise<Gateway> | undefined;
let buckets = 0;

/** The gateway, started on first use. Its keys go into the environment, where the S3 client finds them as in real use. */
export function gateway(): Promise<Gateway> {
  opened ??= open();
  return opened;
}

async function open(): Promise<Gateway> {
  const answer = await fetch(door!);
  if (!answer.ok) throw new Error(`the S3 gateway did not start: ${await answer.text()}`);
  const found = (await answer.json()) as Gateway;
  process.env.AWS_ACCESS_KEY_ID = found.accessKey;
  process.env.AWS_SECRET_ACCESS_KEY = found.secretKey;
  process.env.AWS_REGION = "us-east-1";
  return found;
}

/** A client for what the store itself cannot do: making buckets, setting policies, deleting. */
export async function rawClient(): Promise<S3Client> {
  const { endpoint } = await gateway();
  return new S3Client({ endpoint, forcePathStyle: true });
}

/** The name of a new empty bucket on the gateway. */
export async function cephBucket(): Promise<string> {
  const bucket = `test-${process.pid}-${Date.now().toString(36)}-${buckets++}`;
  await (await rawClient()).send(new CreateBucketCommand({ Bucket: bucket }));
  return bucket;
}

/**
 * A store in a new bucket of the gateway, or `undefined` where Ceph is not installed. `endpoint` may put
 * something in between.
 */
export async function cephStore(prefix: string, endpoint?: string): Promise<S3Store | undefined> {
  if (!hasGateway) return undefined;
  const reached = endpoint ?? (await gateway()).endpoint;
  return new S3Store(await cephBucket(), prefix, { endpoint: reached, idleMilliseconds: 2_000 });
}
