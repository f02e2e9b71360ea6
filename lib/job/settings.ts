import * as z from "zod/mini";
import type { Problem } from "../series/series.ts";
import { tableSettingsSchema, timeZoneSchema } from "../series/tableSettings.ts";
import { problemOfSyntax, problemsOfIssues } from "./settingsProblems.ts";

const say = (text: string) => z.describe(text);

/** `env:NAME` or `secret:NAME`: where a value is kept that must not stand in a file. */
const reference = (meaning: string) =>
  z.string().check(
    z.regex(/^(env|secret):[A-Za-z_][A-Za-z0-9_-]*$/, {
      error: "must be env:NAME or secret:NAME, never the value itself",
    }),
    say(meaning),
  );

const timeZone = timeZoneSchema.check(
  say("IANA name of the zone whose calendar days and clock times the tables use."),
);

const locale = z.string().check(
  z.refine((name) => isKnown(() => new Intl.NumberFormat(name)), {
    error: "must be a language tag such as en-GB",
  }),
  say("BCP 47 language tag: how numbers and dates are written, and in which language month names may stand."),
);

const webhookSchema = z.strictObject({
  name: z.string().check(z.minLength(1), say("What the webhook is called in reports.")),
  audience: z
    .enum(["business", "analyst", "operations"])
    .check(
      say("Who reads it: business the coming numbers, analyst what changed and why, operations what failed."),
    ),
  body: z
    ._default(z.enum(["text", "content", "card", "json"]), "text")
    .check(say("The shape of the body the receiver understands.")),
  address: reference("Where the https:// address is kept: env:NAME or secret:NAME."),
  signingKey: z.optional(
    reference("Where the whsec_ key is kept that signs every post: env:NAME or secret:NAME."),
  ),
});

const share = z.number().check(z.gt(0), z.lt(1));

/** The whole of `settings.json`. Every key may be left out; unknown keys are refused. */
export const settingsSchema = z.strictObject({
  $schema: z.optional(z.string().check(say("Address of this schema, for editors; not used."))),
  timeZone: z._default(timeZone, "UTC"),
  locale: z._default(locale, "en-GB"),
  horizon: z._default(
    z.int().check(z.minimum(1), z.maximum(1000), say("How many periods ahead to forecast.")),
    8,
  ),
  levels: z._default(
    z
      .array(z.number().check(z.gt(0), z.lt(100)))
      .check(z.minLength(1), say("Levels of the forecast ranges, in percent.")),
    [80, 95],
  ),
  falseAlarmRate: z._default(
    share.check(
      say(
        "The chance that a series which did not change brings any notice of change within a year of weekly looks.",
      ),
    ),
    0.05,
  ),
  falseDiscoveryRate: z.optional(
    share.check(
      say("With many series: the share of notices that may be false; notices are then chosen together."),
    ),
  ),
  quietWhenSteady: z._default(z.boolean().check(say("Say little when nothing changed.")), false),
  staleAfter: z._default(
    z.int().check(z.minimum(1), say("After how many missing periods a table is called late.")),
    2,
  ),
  country: z.optional(
    z.string().check(
      z.regex(/^[A-Z]{2}(-[A-Z0-9]{1,3})?$/, {
        error: "must be a country code such as PT, or with a region DE-BY",
      }),
      say("ISO 3166 code whose public holidays explain values; no holidays are used without it."),
    ),
  ),
  reportBase: z.optional(
    z
      .string()
      .check(
        z.regex(/^https:\/\/[^\s]+$/, { error: "must be an https:// address" }),
        say("https:// address under which the store can be opened, for links to reports."),
      ),
  ),
  webhooks: z._default(
    z.array(webhookSchema).check(
      z.refine((all) => new Set(all.map(({ name }) => name)).size === all.length, {
        error: "must have different names",
      }),
      say("Where messages are posted."),
    ),
    [],
  ),
  tables: z._default(
    z
      .record(z.string(), tableSettingsSchema)
      .check(say("What to know of single tables, by name: loans, north/calls.")),
    {},
  ),
});

export type Settings = z.infer<typeof settingsSchema>;
export type WebhookSettings = Settings["webhooks"][number];

/** Settings as a person or program writes them: every key may be left out. */
export type SettingsInput = z.input<typeof settingsSchema>;

export const defaultSettings: Settings = settingsSchema.parse({});

/** The keys the schema knows at a path. */
function knownKeys(path: readonly PropertyKey[]): readonly string[] {
  if (path.length === 0) return Object.keys(settingsSchema.shape).filter((key) => key !== "$schema");
  if (path[0] === "webhooks") return Object.keys(webhookSchema.shape);
  return path.length > 2 ? ["above", "below"] : Object.keys(tableSettingsSchema.shape);
}

function isKnown(make: () => unknown): boolean {
  try {
    make();
    return true;
  } catch {
    return false;
  }
}

/**
 * Reads the text of `settings.json`. Every problem is told at once, each with its line; with any problem the
 * settings returned are the defaults and must not be used.
 *
 * @example parseSettings(undefined).settings.horizon // 8
 */
export function parseSettings(text: string | undefined): { settings: Settings; problems: Problem[] } {
  if (text === undefined || text.trim() === "") return { settings: defaultSettings, problems: [] };
  let value: unknown;
  try {
    value = JSON.parse(text.replace(/^\uFEFF/, ""));
  } catch (error) {
    return { settings: defaultSettings, problems: [problemOfSyntax(text, error as Error)] };
  }
  const parsed = settingsSchema.safeParse(value);
  if (parsed.success) return { settings: parsed.data, problems: [] };
  return {
    settings: defaultSettings,
    problems: problemsOfIssues(text, value, parsed.error.issues, knownKeys),
  };
}
