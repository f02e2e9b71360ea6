import type { S3Client } from "@aws-sdk/client-s3";

type S3Module = Omit<typeof import("./s3Sdk.ts"), "S3Client">;

/** How to reach the server. */
export interface S3Settings {
  /** Another S3-compatible server than AWS's. */
  readonly endpoint?: string | undefined;
  /** Found by the client (profile, environment) when absent; `us-east-1` with an endpoint. */
  readonly region?: string | undefined;
  /** A connection on which nothing moves for this long is cut and the request tried again; 20 s by default. */
  readonly idleMilliseconds?: number | undefined;
}

/** The SDK with a client made from it. */
export interface S3Access {
  readonly sdk: S3Module;
  readonly client: S3Client;
}

/**
 * Loads the SDK and makes a client: five tries a request with the SDK's own backoff (throttling included),
 * short connection and idle limits, a redirect to the bucket's region followed. With an endpoint of one's
 * own, path-style addresses, and checksums only where S3 requires them, since several compatible servers
 * refuse the newer ones (aws-sdk-js-v3 issue 6810).
 */
export async function connectS3(settings: S3Settings): Promise<S3Access> {
  const { GetObjectCommand, HeadObjectCommand, ListObjectsV2Command, PutObjectCommand, S3Client } =
    await import("./s3Sdk.ts");
  const sdk = { GetObjectCommand, HeadObjectCommand, ListObjectsV2Command, PutObjectCommand };
  const { endpoint } = settings;
  const region = settings.region ?? (endpoint === undefined ? undefined : "us-east-1");
  const client = new S3Client({
    ...(region === undefined ? {} : { region }),
    ...(endpoint === undefined
      ? { followRegionRedirects: true }
      : {
          endpoint,
          forcePathStyle: true,
          requestChecksumCalculation: "WHEN_REQUIRED",
          responseChecksumValidation: "WHEN_REQUIRED",
        }),
    maxAttempts: 5,
    requestHandler: { connectionTimeout: 5_000, socketTimeout: settings.idleMilliseconds ?? 20_000 },
  });
  return { sdk, client };
}
