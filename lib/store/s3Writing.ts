import { randomUUID } from "node:crypto";
import { setTimeout as sleep } from "node:timers/promises";
import { contentType } from "./contentType.ts";
import type { S3Access } from "./s3Client.ts";
import { attempts, s3Failure } from "./s3Failure.ts";

/** How often a create that met another one under way (409) is sent, the first time included. */
const createTries = 6;

/** One object to be written. */
export interface S3Target {
  readonly bucket: string;
  /** Prefix included. */
  readonly key: string;
  readonly bytes: Uint8Array;
}

/** Writes or replaces an object; with `writer`, only where none stands, marked as the writer's. */
export async function putS3({ sdk, client }: S3Access, target: S3Target, writer?: string): Promise<void> {
  await client.send(
    new sdk.PutObjectCommand({
      Bucket: target.bucket,
      Key: target.key,
      Body: target.bytes,
      ContentType: contentType(target.key),
      ...(writer === undefined ? {} : { IfNoneMatch: "*", Metadata: { writer } }),
    }),
  );
}

/**
 * Writes an object where none stands: a put with `If-None-Match: *`.
 *
 * Each create carries a mark of its own as metadata. The SDK repeats a put whose answer was lost, and then finds its
 * own object in the way (412); the mark tells that from another writer's object, even when the bytes are the same.
 * A put that meets another under way (409) is not repeated by the SDK, but here.
 */
export async function createS3(access: S3Access, target: S3Target): Promise<"created" | "exists"> {
  const mark = randomUUID();
  // Whether an earlier sending may have been carried out without our hearing of it.
  let mayHaveWon = false;
  for (let attempt = 1; ; attempt++) {
    try {
      await putS3(access, target, mark);
      return "created";
    } catch (error) {
      const failure = s3Failure(error);
      mayHaveWon ||= attempts(error) > 1;
      if (failure === "exists") {
        return mayHaveWon && (await writerOf(access, target)) === mark ? "created" : "exists";
      }
      if (failure !== "conflict" || attempt === createTries) throw error;
      await sleep(50 * 2 ** attempt);
    }
  }
}

/**
 * Whether a server honours the condition that `createS3` rests on, tried on an object that was just created: the
 * same bytes are put again and have to be refused. Some S3-compatible servers take no notice of conditions, and two
 * runs would then overwrite each other unseen. `undefined` when the trial itself failed.
 */
export async function honoursConditions(access: S3Access, created: S3Target): Promise<boolean | undefined> {
  try {
    await putS3(access, created, randomUUID());
    return false;
  } catch (error) {
    const failure = s3Failure(error);
    return failure === "exists" || failure === "conflict" ? true : undefined;
  }
}

/** The mark of whoever created the object that stands there. */
async function writerOf({ sdk, client }: S3Access, { bucket, key }: S3Target): Promise<string | undefined> {
  const head = await client.send(new sdk.HeadObjectCommand({ Bucket: bucket, Key: key }));
  return head.Metadata?.writer;
}
