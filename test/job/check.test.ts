import { describe, expect, it } from "vitest";
import { checkStore } from "../../lib/job/check.ts";
import { describeCheck } from "../../lib/job/describeCheck.ts";
import type { ObjectStore } from "../../lib/store/objectStore.ts";
import { dates } from "../series/corpus/dates.ts";
import { dialects } from "../series/corpus/dialects.ts";
import { faults } from "../series/corpus/faults.ts";
import { numbers } from "../series/corpus/numbers.ts";
import { periods } from "../series/corpus/periods.ts";
import { shapes } from "../series/corpus/shapes.ts";

/** A store that holds these files and refuses every write. */
function storeOf(files: Record<string, string | Uint8Array>): ObjectStore {
  const bytesOf = (key: string) => {
    const file = files[key];
    return typeof file === "string" ? new Uint8Array(Buffer.from(file)) : file;
  };
  const refuse = () => Promise.reject(new Error("check must not write"));
  return {
    address: "./my-store",
    read: async (key) => (key in files ? { bytes: bytesOf(key), version: "1" } : undefined),
    async stream(key) {
      if (!(key in files)) return undefined;
      return (async function* () {
        yield bytesOf(key);
      })();
    },
    create: refuse,
    write: refuse,
    list: async (prefix) =>
      Object.keys(files)
        .filter((key) => key.startsWith(prefix))
        .sort()
        .map((key) => ({ key, size: bytesOf(key).length, version: "1" })),
  };
}

const asOf = "2026-12-01T06:00:00Z";
const tell = async (files: Record<string, string | Uint8Array>) =>
  describeCheck(await checkStore({ store: storeOf(files), asOf }));

const weeks = (count: number, skip: readonly number[] = []) =>
  `week,Quay,Mill\n${Array.from({ length: count }, (_, at) => {
    const day = new Date(Date.UTC(2026, 10, 23) - (count - 1 - at) * 7 * 86_400_000)
      .toISOString()
      .slice(0, 10);
    return `${day},${100 + at},${skip.includes(at) ? "" : 50 + at}\n`;
  }).join("")}`;

describe("check", () => {
  it("reads like a helpful colleague when all is well", async () => {
    expect(await tell({ "series/loans.csv": weeks(60, [20, 21]) })).toEqual([
      "The one table in ./my-store can be read.",
      "",
      "loans",
      "  2 weekly series (Quay and Mill), from the week of 6 October 2025 to the week of 23 November",
      "  gaps: Mill has 2, the latest in the week of 2 March 2026",
      '  read as: commas between cells; dates in "week" written YYYY-MM-DD; decimal point; weeks begin on Monday',
    ]);
  });

  it("tells closed days apart from missing ones", async () => {
    const days = (isOpen: (weekday: number, at: number) => boolean) =>
      `day,sold\n${Array.from({ length: 70 }, (_, at) => new Date(Date.UTC(2026, 8, 21) + at * 86_400_000))
        .filter((date, at) => isOpen(date.getUTCDay(), at))
        .map((date) => `${date.toISOString().slice(0, 10)},${100 + date.getUTCDate()}\n`)
        .join("")}`;
    const hint = (gaps: string) =>
      `  hardly any ${gaps} has a value: if those days count as nothing (nothing sold, no calls), say "emptyMeans": "zero" in the settings of this table; all gaps count as nothing then`;
    const told = async (isOpen: (weekday: number, at: number) => boolean) =>
      (await tell({ "series/till.csv": days(isOpen) })).filter((line) => line.includes("hardly any"));
    expect(await told((weekday) => weekday !== 0)).toEqual([hint("Sunday")]);
    expect(await told((weekday, at) => weekday % 6 !== 0 || at === 69)).toEqual([hint("Sunday or Saturday")]);
    // A shop shut on Sundays may lack a Tuesday too.
    expect(await told((weekday, at) => weekday !== 0 && at !== 29)).toEqual([hint("Sunday")]);
    // Five days missing in a row, or every other Tuesday beside Sundays, are gaps like any other.
    expect(await told((_, at) => at < 20 || at > 24)).toEqual([]);
    expect(await told((weekday, at) => weekday !== 0 && (weekday !== 2 || at % 2 === 0))).toEqual([]);
    // Most Sundays have a value: these four are missing.
    expect(await told((weekday, at) => weekday !== 0 || at > 30)).toEqual([]);
  });

  it("lists every problem of every table with line, column and remedy, and counts what failed", async () => {
    const report = await checkStore({
      store: storeOf({
        "series/good.csv": weeks(30),
        "series/dates.csv": "date,v\n03/04/2026,1\n04/04/2026,2\n",
        "series/cells.csv": "date,v\n2026-03-01,1\n2026-03-02,closed\n2026-03-03,3\n",
        "series/book.csv": Uint8Array.of(0x50, 0x4b, 3, 4, 20, 0),
        "series/notes.docx": "x",
      }),
      asOf,
    });
    expect(report.failed).toBe(2);
    const lines = describeCheck(report);
    expect(lines[0]).toBe("2 of 4 tables in ./my-store can be read.");
    expect(lines).toContain("book cannot be read");
    expect(lines).toContain("dates cannot be read");
    expect(lines).toContain(
      '  line 2, column "date": "03/04/2026" may have the day or the month in front, and no date in the column tells which → say "dateOrder": "day-first" or "dateOrder": "month-first" for this table in the settings',
    );
    expect(lines).toContain(
      '  line 3, column "v": "closed" is no number with a decimal point; it counts as a gap → correct it, or leave the cell empty when the value is not known',
    );
    expect(lines).toContain("not read, as the ending is not known: series/notes.docx");
  });

  it("tells the unfinished period, lateness, aggregation and columns left out", async () => {
    const lines = await tell({
      "series/till.csv":
        "time,branch,amount\n2026-11-26 09:00,a,1\n2026-11-26 10:30,b,2\n2026-11-27 09:10,a,3\n2026-11-27 11:00,b,4\n",
      "series/now.csv": "date,v\n2026-11-29,1\n2026-11-30,2\n2026-12-01,3\n",
      "settings.json": JSON.stringify({ tables: { till: { every: "day", combine: "sum" } } }),
    });
    const text = lines.join("\n");
    expect(text).toContain("Tuesday 1 December is not over yet and is left out");
    expect(text).toContain("the table is behind: 3 days that are over have no value yet");
    expect(text).toContain("several rows of a day make one value: sum");
    expect(text).toContain('left out: "branch"');
  });

  it("tells every problem of the settings, and of tables they name in vain", async () => {
    const wrong = await checkStore({
      store: storeOf({ "series/loans.csv": weeks(30), "settings.json": '{"horizn": 3}' }),
      asOf,
    });
    expect(wrong.failed).toBe(1);
    expect(describeCheck(wrong)).toContain(
      '  line 1: there is no setting "horizn" → did you mean "horizon"?',
    );
    const stranger = await tell({
      "series/loans.csv": weeks(30),
      "settings.json": '{"tables": {"lones": {}}}',
    });
    expect(stranger.join("\n")).toContain('there is no table "lones" under series/ → did you mean "loans"?');
  });

  it("tells the events it read and the ones it could not", async () => {
    const lines = await tell({
      "series/loans.csv": weeks(30),
      "events/city.csv": "date,name\n2026-03-04,fair\nsoon,sale\n",
    });
    expect(lines).toContain("events/city.csv: 1 event");
    expect(lines.join("\n")).toContain('line 3, column "date": "soon" is no date');
  });

  it("counts the public holidays of the country set, and says when it knows none", async () => {
    const told = (country: string) =>
      tell({ "series/loans.csv": weeks(30), "settings.json": JSON.stringify({ country }) });
    // Thirteen mandatory holidays: Código do Trabalho, artigo 234.º.
    expect(await told("PT")).toContain("public holidays of PT in 2026: 13 events");
    expect((await told("XX")).join("\n")).toContain('no public holidays are known for "XX" →');
  });

  it("says what to do with an empty store", async () => {
    expect(await tell({})).toEqual([
      "There are no tables in ./my-store yet: put CSV files under series/, such as series/loans.csv.",
    ]);
  });

  it("reads every table of the corpus without a crash, and never speaks in code", async () => {
    const all = [...dialects, ...numbers, ...dates, ...periods, ...shapes, ...faults];
    const files: Record<string, string | Uint8Array> = {};
    const tables: Record<string, unknown> = {};
    for (const [at, { input, settings, timeZone }] of all.entries()) {
      const name = `case${String(at).padStart(3, "0")}`;
      files[`series/${name}.csv`] = input;
      tables[name] = { ...settings, ...(timeZone ? { timeZone } : {}) };
    }
    files["settings.json"] = JSON.stringify({ tables });
    const report = await checkStore({ store: storeOf(files), asOf });
    expect(report.settings.problems).toEqual([]);
    expect(report.tables).toHaveLength(all.length);
    for (const table of report.tables)
      expect(table.readable).toBe(!table.problems.some((problem) => problem.fatal));
    for (const line of describeCheck(report)) {
      expect(line).not.toMatch(/undefined|null|NaN|\[object|\.ts\b/);
      expect(line.length).toBeLessThan(420);
    }
  });
});
