import { Duration, RemovalPolicy, Validations } from "aws-cdk-lib";
import { Key } from "aws-cdk-lib/aws-kms";
import {
  BlockPublicAccess,
  Bucket,
  BucketEncryption,
  type IBucket,
  ObjectOwnership,
} from "aws-cdk-lib/aws-s3";
import type { Construct } from "constructs";
import type { CheckedOptions } from "./options.ts";
import type { StoreLocation } from "./storeAccess.ts";

/**
 * The bucket of the store: private, owner-enforced, TLS 1.2 only, encrypted, versioned, and kept when the stack
 * goes. Replaced versions (the user's own tables, `latest.csv`, reports) stay a year by default; uploads that were
 * never finished go after a week. An existing bucket is taken as it is and nothing of it is changed.
 */
export function storeLocation(scope: Construct, options: CheckedOptions): StoreLocation {
  const prefix = options.prefix === undefined ? "" : `${options.prefix}/`;
  const key =
    options.kmsKeyArn === undefined ? undefined : Key.fromKeyArn(scope, "StoreKey", options.kmsKeyArn);
  if (options.bucketName !== undefined)
    return { bucket: Bucket.fromBucketName(scope, "Store", options.bucketName), prefix, key };
  const bucket = new Bucket(scope, "Store", {
    blockPublicAccess: BlockPublicAccess.BLOCK_ALL,
    objectOwnership: ObjectOwnership.BUCKET_OWNER_ENFORCED,
    enforceSSL: true,
    minimumTLSVersion: 1.2,
    versioned: true,
    ...(key === undefined
      ? { encryption: BucketEncryption.S3_MANAGED }
      : { encryption: BucketEncryption.KMS, encryptionKey: key, bucketKeyEnabled: true }),
    removalPolicy: RemovalPolicy.RETAIN,
    lifecycleRules: [
      {
        id: "old-versions",
        noncurrentVersionExpiration: Duration.days(options.oldVersionDays),
        expiredObjectDeleteMarker: true,
      },
      { id: "unfinished-uploads", abortIncompleteMultipartUploadAfter: Duration.days(7) },
    ],
  });
  Validations.of(bucket).acknowledge({
    id: "AwsSolutions-S1",
    reason:
      "Access logs would need a second bucket to look after. Versions tell what changed; CloudTrail data events tell who read, for those who must know.",
  });
  return { bucket: bucket as IBucket, prefix, key };
}
