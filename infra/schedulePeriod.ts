const unitHours: Readonly<Record<string, number>> = { minute: 1 / 60, hour: 1, day: 24 };

/**
 * What is wrong with a schedule expression, or `undefined`. Taken are EventBridge Scheduler's `rate(7 days)`
 * and `cron(0 6 ? * MON *)`; a one-time `at(…)` is refused, since nothing would be watched after it.
 */
export function scheduleFault(expression: string): string | undefined {
  const rate = /^rate\((\d+) (minute|hour|day)s?\)$/.exec(expression);
  if (rate)
    return Number(rate[1]) * unitHours[rate[2]] < 1 ? "must not run more often than hourly" : undefined;
  const cron = /^cron\((.*)\)$/.exec(expression);
  if (!cron) return "must be rate(7 days) or cron(0 6 ? * MON *)";
  const fields = cron[1].split(" ");
  if (fields.length !== 6) return "must be cron(minute hour day-of-month month day-of-week year): six fields";
  if (!fields.every((field) => /^[0-9A-Z*?,/#L-]+W?$/.test(field)))
    return "has a cron field that cannot be read";
  if ((fields[2] === "?") === (fields[4] === "?"))
    return "must have ? in either the day-of-month or the day-of-week field of cron";
  if (!/^\d{1,2}$/.test(fields[0]))
    return "must not run more often than hourly: one minute in the first field of cron";
  return undefined;
}

/**
 * The longest time in hours that can pass between two runs, for the alarm on missing runs. A cron expression is
 * judged by its coarsest field, on the safe side: weekdays of any kind count as weekly, days of a month as monthly.
 *
 * @example longestGapHours("rate(7 days)") // 168
 * @example longestGapHours("cron(0 6 1 * ? *)") // 744, the longest month
 */
export function longestGapHours(expression: string): number {
  const rate = /^rate\((\d+) (minute|hour|day)s?\)$/.exec(expression);
  if (rate) return Number(rate[1]) * unitHours[rate[2]];
  const [, hour, dayOfMonth, month, dayOfWeek] = expression.slice("cron(".length, -1).split(" ");
  if (month !== "*") return 366 * 24;
  if (dayOfMonth !== "*" && dayOfMonth !== "?") return 31 * 24;
  if (dayOfWeek.includes("#") || dayOfWeek.endsWith("L")) return 35 * 24;
  if (dayOfWeek !== "*" && dayOfWeek !== "?") return 7 * 24;
  return hour === "*" ? 1 : 24;
}
