/**
 * What is planted in the demo tables, so that tests can ask whether the job found it.
 * A lending library for tools with four branches: weekly loans, calls to the desk a day, members a month.
 */
export const demoTruths = {
  /** The instant the newest run of the demo stands at: Monday morning, all weeks before it complete. */
  asOf: "2026-11-30T06:00:00Z",
  loans: {
    firstWeek: "2021-12-06",
    weeks: 260,
    /** Shocks begin to fade slowly here: φ goes from 0.35 to 0.88, so the half-life from 0.8 to 5.4 weeks. */
    Quay: { level: 260, shockSize: 17, before: 0.35, after: 0.88, changedInWeek: "2026-05-25" },
    /** Closed for a fortnight at the turn of the year: two gaps. */
    Mill: { level: 182, shockSize: 13, coefficient: 0.5, closedWeeks: ["2025-12-22", "2025-12-29"] },
    /** Nothing ever happens here. */
    Park: { level: 324, shockSize: 16, coefficient: 0.6 },
    /** One week stands out and its effect ebbs away. */
    Station: { level: 140, shockSize: 10, coefficient: 0.7, surpriseWeek: "2026-11-16", surprise: 62 },
  },
  deskCalls: {
    firstDay: "2024-09-01",
    days: 820,
    level: 46,
    shockSize: 5,
    coefficient: 0.4,
    /** Added to the level, Monday first; closed desks on Sunday still get calls. */
    weekday: [14, 4, 0, 2, 6, -8, -18],
  },
  members: { firstMonth: "2019-01", months: 94, level: 810, growth: 6.5, shockSize: 9, coefficient: 0.55 },
} as const;
