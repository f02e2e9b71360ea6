import type { GetObjectCommandOutput } from "@aws-sdk/client-s3";
import type { S3Access } from "./s3Client.ts";

/** How often the bytes of one object are asked for, the first time included, when the connection breaks. */
const tries = 5;

/** One object being read: its version, its size, and its bytes from the start, piece by piece. */
export interface S3Reading {
  readonly version: string;
  readonly size: number;
  pieces(): AsyncIterable<Uint8Array>;
}

/**
 * Starts to read an object. The SDK tries again until an answer has begun, not after; so when a body breaks
 * off, stalls or ends early, the rest is asked for from where it stopped, and the version compared, so that
 * no mixture of two versions is ever handed out.
 */
export async function readS3({ sdk, client }: S3Access, bucket: string, key: string): Promise<S3Reading> {
  const ask = (from: number) =>
    client.send(
      new sdk.GetObjectCommand({
        Bucket: bucket,
        Key: key,
        ...(from > 0 ? { Range: `bytes=${from}-` } : {}),
      }),
    );
  const first = await ask(0);
  const version = versionOf(first.ETag);
  const size = first.ContentLength ?? 0;

  async function* pieces(): AsyncIterable<Uint8Array> {
    let given = 0;
    let answer = first;
    for (let attempt = 1; ; attempt++) {
      try {
        for await (const piece of bodyOf(answer)) {
          given += piece.length;
          yield piece;
        }
        if (given >= size) break;
        throw new Error(`the body ended after ${given} of ${size} bytes`);
      } catch (error) {
        if (attempt >= tries) throw error;
      }
      if (given >= size) break;
      answer = await ask(given);
      if (versionOf(answer.ETag) !== version) throw new Error("the object was replaced while it was read");
    }
    if (given !== size) throw new Error(`the body held ${given} bytes where ${size} were announced`);
  }
  return { version, size, pieces };
}

/** The ETag without its quotes. */
export function versionOf(etag: string | undefined): string {
  return (etag ?? "").replaceAll('"', "");
}

function bodyOf(answer: GetObjectCommandOutput): AsyncIterable<Uint8Array> {
  return answer.Body as unknown as AsyncIterable<Uint8Array>;
}
