// The parts of the SDK in use, by name: a bundler can then leave the rest of it out, which `import()` of the
// whole package would not let it.
export {
  GetObjectCommand,
  HeadObjectCommand,
  ListObjectsV2Command,
  PutObjectCommand,
  S3Client,
} from "@aws-sdk/client-s3";
