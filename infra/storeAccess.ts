import { Stack } from "aws-cdk-lib";
import { PolicyStatement } from "aws-cdk-lib/aws-iam";
import type { IKey } from "aws-cdk-lib/aws-kms";
import type { IBucket } from "aws-cdk-lib/aws-s3";

/** The parts of the store, as the keys below the prefix begin. */
export type StorePart = "settings.json" | "events/" | "series/" | "models/" | "forecasts/" | "runs/";

/** Where the store lies: a bucket, and a prefix in it that is empty or ends with `/`. */
export interface StoreLocation {
  readonly bucket: IBucket;
  readonly prefix: string;
  readonly key?: IKey | undefined;
}

export interface StoreRights {
  readonly read: readonly StorePart[];
  readonly write: readonly StorePart[];
  readonly list: readonly StorePart[];
}

/**
 * Statements for exact actions on exact prefixes: get, put and list, and no delete.
 *
 * Listing also covers what is read, because S3 answers 403 instead of 404 for an absent key to whoever may not
 * list it. With a customer key, its use is confined to S3 in this region.
 */
export function storeStatements(location: StoreLocation, rights: StoreRights): PolicyStatement[] {
  const { bucket, prefix } = location;
  const objects = (parts: readonly StorePart[]) =>
    parts.map((part) => bucket.arnForObjects(pattern(prefix, part)));
  const statements: PolicyStatement[] = [];
  if (rights.read.length > 0)
    statements.push(new PolicyStatement({ actions: ["s3:GetObject"], resources: objects(rights.read) }));
  if (rights.write.length > 0)
    statements.push(new PolicyStatement({ actions: ["s3:PutObject"], resources: objects(rights.write) }));
  const listed = [...new Set([...rights.list, ...rights.read])].map((part) => `${prefix}${part}*`);
  statements.push(
    new PolicyStatement({
      actions: ["s3:ListBucket"],
      resources: [bucket.bucketArn],
      conditions: { StringLike: { "s3:prefix": listed } },
    }),
  );
  return [...statements, ...keyStatements(location)];
}

/** `settings.json` is one object; the other parts end with `/` and stand for all below. */
function pattern(prefix: string, part: StorePart): string {
  return `${prefix}${part}${part.endsWith("/") ? "*" : ""}`;
}

/** The use of the bucket's own key, where it has one, by way of S3 in this region only. */
export function keyStatements({ bucket, key }: StoreLocation): PolicyStatement[] {
  if (key === undefined) return [];
  const stack = Stack.of(bucket);
  return [
    new PolicyStatement({
      actions: ["kms:Decrypt", "kms:GenerateDataKey"],
      resources: [key.keyArn],
      conditions: { StringEquals: { "kms:ViaService": `s3.${stack.region}.amazonaws.com` } },
    }),
  ];
}
