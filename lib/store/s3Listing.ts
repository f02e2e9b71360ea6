import { byKey, keyFault } from "./key.ts";
import type { ObjectEntry } from "./objectStore.ts";
import type { S3Access } from "./s3Client.ts";
import { versionOf } from "./s3Reading.ts";

/**
 * Every object below `base` whose key (without `base`) starts with `prefix`, page by page to the end,
 * ordered by code units (S3 orders by UTF-8 bytes, which differs beyond U+FFFF). Folder markers and keys
 * that no store would take are left out. Keys travel URL-encoded, since XML cannot hold every character.
 */
export async function listS3(
  { sdk, client }: S3Access,
  bucket: string,
  base: string,
  prefix: string,
): Promise<ObjectEntry[]> {
  const entries: ObjectEntry[] = [];
  let token: string | undefined;
  do {
    const page = await client.send(
      new sdk.ListObjectsV2Command({
        Bucket: bucket,
        Prefix: base + prefix,
        EncodingType: "url",
        ...(token === undefined ? {} : { ContinuationToken: token }),
      }),
    );
    for (const { Key, Size, ETag } of page.Contents ?? []) {
      const key = decode(Key ?? "").slice(base.length);
      if (keyFault(key) === undefined) entries.push({ key, size: Size ?? 0, version: versionOf(ETag) });
    }
    const next = page.NextContinuationToken;
    if (page.IsTruncated && (next === undefined || next === token)) {
      throw new Error("the listing broke off: a further page was announced and not named");
    }
    token = page.IsTruncated ? next : undefined;
  } while (token !== undefined);
  return entries.sort(byKey);
}

/** S3 writes a space as `+` and a plus as `%2B`. */
function decode(text: string): string {
  return decodeURIComponent(text.replaceAll("+", "%20"));
}
