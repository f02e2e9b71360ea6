/** The little of an SDK error that is asked for here; everything else on it stays unread. */
interface Fault {
  readonly name?: string;
  readonly message?: string;
  readonly code?: string;
  readonly $metadata?: { readonly httpStatusCode?: number; readonly attempts?: number };
}

/** What a failed request comes to, for the store's decisions. */
export type S3Failure =
  /** No such key. */
  | "absent"
  /** Refused, which without the right to list is also the answer for an absent key. */
  | "denied"
  /** 412: something stands there already. */
  | "exists"
  /** 409: another conditional write was under way; the SDK does not try again. */
  | "conflict"
  | "other";

/** Sorts a failed request by error name, and by status where a server names it differently. */
export function s3Failure(error: unknown): S3Failure {
  const { name, $metadata } = error as Fault;
  const status = $metadata?.httpStatusCode;
  if (name === "NoSuchBucket") return "other";
  if (name === "NoSuchKey" || name === "NotFound" || status === 404) return "absent";
  if (status === 403 && (name === "AccessDenied" || name === "Forbidden" || name === "403")) return "denied";
  if (name === "PreconditionFailed" || status === 412) return "exists";
  if (name === "ConditionalRequestConflict" || status === 409) return "conflict";
  return "other";
}

/** How many times the SDK sent a request that failed in the end; at least one. */
export function attempts(error: unknown): number {
  return (error as Fault).$metadata?.attempts ?? 1;
}

const remedies: Readonly<Record<string, string>> = {
  NoSuchBucket: "there is no such bucket",
  CredentialsProviderError: "no AWS credentials were found",
  InvalidAccessKeyId: "the access key is not known to the server",
  SignatureDoesNotMatch: "the server refused the signature: wrong secret key or a clock that is off",
  ExpiredToken: "the AWS credentials have expired",
  PermanentRedirect: "the bucket is in another region: set AWS_REGION",
};

/**
 * A new error that says what went wrong and nothing more: SDK errors carry access key, signature, string to
 * sign and host ids as properties, which would end in a log with them.
 */
export function plainS3Error(error: unknown): Error {
  const { message = "", code, $metadata } = error as Fault;
  const name = nameOf(error as Fault);
  const status = $metadata?.httpStatusCode;
  const firstLine = message
    .split("\n", 1)[0]!
    .replace(/\p{Cc}/gu, " ")
    .slice(0, 300);
  const said = remedies[name] ?? (/^Region is missing/.test(message) ? "set AWS_REGION" : firstLine);
  const codeSaid = code && /^[A-Z][A-Z0-9_]*$/.test(code) && !said.includes(code) ? ` ${code}` : "";
  const statusSaid = status === undefined || status < 300 ? "" : ` (${status})`;
  const label = `${name === "Error" ? "" : name}${codeSaid}${statusSaid}`.trim();
  return new Error(label && said ? `${label}: ${said}` : label || said);
}

/** A server may answer with any text for a name. */
function nameOf({ name }: Fault): string {
  return name !== undefined && /^[A-Za-z0-9.]{1,80}$/.test(name) ? name : "Error";
}
