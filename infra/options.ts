import { z } from "zod";
import { scheduleFault } from "./schedulePeriod.ts";

const days = [1, 3, 5, 7, 14, 30, 60, 90, 120, 150, 180, 365, 400, 545, 731, 1827, 3653] as const;

function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat("en", { timeZone: name });
    return true;
  } catch {
    return false;
  }
}

/** `-c` gives text, cdk.json gives numbers, booleans and lists: both are taken. */
const list = (item: z.ZodString) =>
  z.preprocess(
    (value) => (typeof value === "string" ? value.split(",").map((part) => part.trim()) : value),
    z.array(item).min(1),
  );
const whole = (least: number, most: number) => z.coerce.number().int().min(least).max(most);
const yesOrNo = z.preprocess(
  (value) => (value === "true" ? true : value === "false" ? false : value),
  z.boolean("must be true or false"),
);

/** Everything a deployment can choose. Each has a working default; the README lists them. */
export const optionsSchema = z
  .strictObject({
    stackName: z
      .string()
      .regex(/^[A-Za-z][A-Za-z0-9-]{0,99}$/, "must be letters, digits and hyphens, a letter first")
      .default("Ebbwire"),
    schedule: z
      .string()
      .superRefine((text, context) => {
        const fault = scheduleFault(text);
        if (fault !== undefined) context.addIssue({ code: "custom", message: fault });
      })
      .default("cron(0 6 ? * MON *)"),
    timeZone: z.string().refine(isTimeZone, "must be an IANA time zone such as Europe/Lisbon").default("UTC"),
    memory: whole(256, 10_240).default(1769),
    // Closing holds the facts of all series at once; more than 3,008 MB is refused to new accounts.
    closingMemory: whole(256, 10_240).default(3008),
    timeoutMinutes: whole(2, 15).default(15),
    fleet: z.enum(["auto", "always", "never"], 'must be "auto", "always" or "never"').default("auto"),
    fleetConcurrency: whole(1, 1000).default(40),
    toleratedFailurePercentage: whole(0, 100).default(10),
    bucketName: z
      .string()
      .regex(/^[a-z0-9][a-z0-9.-]{1,61}[a-z0-9]$/, "must be the name of an existing bucket")
      .optional(),
    prefix: z
      .string()
      .regex(
        /^[A-Za-z0-9_-]+(\/[A-Za-z0-9_-]+)*$/,
        "must be folder names with / between, without one at the ends",
      )
      .optional(),
    kmsKeyArn: z
      .string()
      .regex(
        /^arn:[a-z-]+:kms:[a-z0-9-]+:\d{12}:key\/(mrk-[0-9a-f]{32}|[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12})$/,
        "must be the ARN of a KMS key (not an alias)",
      )
      .optional(),
    subnetIds: list(
      z.string().regex(/^subnet-([0-9a-f]{8}|[0-9a-f]{17})$/, "must be ids such as subnet-0123456789abcdef0"),
    ).optional(),
    securityGroupIds: list(
      z.string().regex(/^sg-([0-9a-f]{8}|[0-9a-f]{17})$/, "must be ids such as sg-0123456789abcdef0"),
    ).optional(),
    alarmTopicArn: z
      .string()
      .regex(/^arn:[a-z-]+:sns:[a-z0-9-]+:\d{12}:[A-Za-z0-9_-]+$/, "must be the ARN of an SNS topic")
      .optional(),
    alarmEmail: z.email("must be an e-mail address").optional(),
    logRetentionDays: z.coerce
      .number()
      .refine((value) => days.some((day) => day === value), `must be one of ${days.join(", ")}`)
      .default(90),
    oldVersionDays: whole(1, 3650).default(365),
    reservedConcurrency: whole(1, 1000).optional(),
    dashboard: yesOrNo.default(true),
    costCenter: z.string().min(1).max(256).optional(),
  })
  .superRefine((options, context) => {
    const issue = (path: string, message: string) =>
      context.addIssue({ code: "custom", path: [path], message });
    if ((options.subnetIds === undefined) !== (options.securityGroupIds === undefined))
      issue("subnetIds", "and securityGroupIds need each other: both or neither");
    if (options.alarmTopicArn !== undefined && options.alarmEmail !== undefined)
      issue("alarmEmail", "cannot stand beside alarmTopicArn: subscribe the address to that topic");
    if (
      options.fleet === "always" &&
      options.reservedConcurrency !== undefined &&
      options.reservedConcurrency < 2
    )
      issue("reservedConcurrency", "must be at least 2 with a fleet");
  });

/** Choices as written: all optional. */
export type Options = z.input<typeof optionsSchema>;
/** Choices as checked: defaults filled in. */
export type CheckedOptions = z.output<typeof optionsSchema>;

/** Choices that cannot be used: the sentence says which and why. */
export class ChoiceError extends TypeError {
  override readonly name = "ChoiceError";
}

/**
 * Checks choices and fills in defaults.
 * @throws {ChoiceError} with one line for every choice that cannot be used, each named as `context` names it
 */
export function checkOptions(options: unknown, named = (name: string) => name): CheckedOptions {
  const result = optionsSchema.safeParse(options);
  if (result.success) return result.data;
  const lines = result.error.issues.flatMap((issue) =>
    issue.code === "unrecognized_keys"
      ? issue.keys.map(
          (key) => `${named(key)} is not known; known are ${Object.keys(optionsSchema.shape).join(", ")}`,
        )
      : [`${named(String(issue.path[0]))} ${issue.message}${received(options, issue.path[0])}`],
  );
  throw new ChoiceError(`the deployment cannot be made:\n  ${lines.join("\n  ")}`);
}

function received(options: unknown, name: PropertyKey | undefined): string {
  const value = (options as Record<PropertyKey, unknown>)[name ?? ""];
  return value === undefined ? "" : `, received ${JSON.stringify(value)}`;
}
