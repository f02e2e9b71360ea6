import { FolderStore } from "./folderStore.ts";
import type { ObjectStore } from "./objectStore.ts";
import { S3Store } from "./s3Store.ts";

/** The environment variables a store listens to, beside those the S3 client reads for its credentials. */
export interface StoreEnvironment {
  readonly AWS_ENDPOINT_URL_S3?: string | undefined;
  readonly AWS_ENDPOINT_URL?: string | undefined;
  readonly AWS_REGION?: string | undefined;
  readonly AWS_DEFAULT_REGION?: string | undefined;
}

const bucketName = /^[a-z0-9][a-z0-9.-]{1,61}[a-z0-9]$/;

/**
 * Opens a store by its address: `s3://bucket/prefix`, or else the path of a folder.
 *
 * The S3 client is loaded on first use, so a folder's users never pay for it. With `AWS_ENDPOINT_URL_S3` or
 * `AWS_ENDPOINT_URL` set, another S3-compatible server is spoken to, by path-style addresses and with
 * checksums only where required. Nothing is read or written here; a missing folder or bucket shows itself
 * at the first listing or reading.
 *
 * @throws {TypeError} when the address is empty, or names no sound bucket or prefix
 * @example openStore("./my-store") // a folder
 * @example openStore("s3://my-bucket/forecasting") // keys below forecasting/
 */
export function openStore(address: string, environment: StoreEnvironment = process.env): ObjectStore {
  if (typeof address !== "string" || address.trim() === "" || address.includes("\0")) {
    throw new TypeError("openStore needs a folder path or s3://bucket/prefix");
  }
  const scheme = /^([a-z][a-z0-9+.-]+):\/\//i.exec(address)?.[1];
  if (scheme === undefined) return new FolderStore(address);
  if (scheme.toLowerCase() !== "s3") {
    throw new TypeError(`openStore knows folder paths and s3://bucket/prefix, not ${scheme}://`);
  }
  const [bucket = "", ...parts] = address.slice("s3://".length).split("/");
  // The address is not repeated here: people paste credentials into such places.
  if (!bucketName.test(bucket)) {
    throw new TypeError("openStore needs s3://bucket/prefix with a bucket name of 3 to 63 of a-z 0-9 . -");
  }
  const endpoint = environment.AWS_ENDPOINT_URL_S3 || environment.AWS_ENDPOINT_URL || undefined;
  const region = environment.AWS_REGION || environment.AWS_DEFAULT_REGION || undefined;
  return new S3Store(bucket, parts.join("/"), { endpoint, region });
}
