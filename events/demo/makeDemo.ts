import { addDays, addMonths, addWeeks, differenceInCalendarWeeks, formatISO } from "date-fns";
import { demoTruths as truths } from "./truths.ts";

/** Seeded uniform numbers in [0, 1): a 32-bit mixing generator, the same everywhere. */
function uniforms(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x9e3779b9) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 16), 0x21f0aaad);
    mixed = Math.imul(mixed ^ (mixed >>> 15), 0x735a2d97);
    return ((mixed ^ (mixed >>> 15)) >>> 0) / 2 ** 32;
  };
}

/** Standard normal numbers (Box and Muller 1958). */
function normals(seed: number): () => number {
  const uniform = uniforms(seed);
  return () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
}

/** Deviations from the level of an AR(1) whose coefficient and extra shock may depend on time. */
function deviations(
  count: number,
  seed: number,
  shockSize: number,
  coefficient: (index: number) => number,
  extraShock: (index: number) => number = () => 0,
): number[] {
  const normal = normals(seed);
  const path: number[] = [];
  let deviation = 0;
  for (let warmUp = 0; warmUp < 60; warmUp++) deviation = coefficient(0) * deviation + shockSize * normal();
  for (let index = 0; index < count; index++) {
    deviation = coefficient(index) * deviation + shockSize * normal() + extraShock(index);
    path.push(deviation);
  }
  return path;
}

const isoDate = (date: Date) => formatISO(date, { representation: "date" });
const count = (value: number) => String(Math.max(0, Math.round(value)));
const localDate = (text: string) => new Date(`${text}T00:00:00`);

function loans(seeds: { Quay: number; Mill: number; Park: number; Station: number }): string {
  const { firstWeek, weeks, Quay, Mill, Park, Station } = truths.loans;
  const first = localDate(firstWeek);
  const weekOf = (text: string) => differenceInCalendarWeeks(localDate(text), first, { weekStartsOn: 1 });
  const changed = weekOf(Quay.changedInWeek);
  const surprise = weekOf(Station.surpriseWeek);
  const closed: number[] = Mill.closedWeeks.map(weekOf);
  const quay = deviations(weeks, seeds.Quay, Quay.shockSize, (week) =>
    week < changed ? Quay.before : Quay.after,
  );
  const mill = deviations(weeks, seeds.Mill, Mill.shockSize, () => Mill.coefficient);
  const park = deviations(weeks, seeds.Park, Park.shockSize, () => Park.coefficient);
  const station = deviations(
    weeks,
    seeds.Station,
    Station.shockSize,
    () => Station.coefficient,
    (week) => (week === surprise ? Station.surprise : 0),
  );
  const rows = quay.map((_, week) =>
    [
      isoDate(addWeeks(first, week)),
      count(Quay.level + quay[week]),
      closed.includes(week) ? "" : count(Mill.level + mill[week]),
      count(Park.level + park[week]),
      count(Station.level + station[week]),
    ].join(","),
  );
  return ["week,Quay,Mill,Park,Station", ...rows, ""].join("\n");
}

function deskCalls(seed: number): string {
  const { firstDay, days, level, shockSize, coefficient, weekday } = truths.deskCalls;
  const first = localDate(firstDay);
  const rows = deviations(days, seed, shockSize, () => coefficient).map((deviation, day) => {
    const date = addDays(first, day);
    return `${isoDate(date)},${count(level + weekday[(date.getDay() + 6) % 7] + deviation)}`;
  });
  return ["day,calls", ...rows, ""].join("\n");
}

function members(seed: number): string {
  const { firstMonth, months, level, growth, shockSize, coefficient } = truths.members;
  const first = localDate(`${firstMonth}-01`);
  const rows = deviations(months, seed, shockSize, () => coefficient).map(
    (deviation, month) =>
      `${isoDate(addMonths(first, month)).slice(0, 7)},${count(level + growth * month + deviation)}`,
  );
  return ["month,members", ...rows, ""].join("\n");
}

/** The demo's tables by file name, the same text on every machine. */
export function demoTables(): Record<string, string> {
  return {
    "loans.csv": loans({ Quay: 8, Mill: 4, Park: 4, Station: 7 }),
    "desk-calls.csv": deskCalls(8),
    "members.csv": members(8),
  };
}
