import { parse } from "csv-parse/sync";
import { readTable } from "../../lib/series/readTable.ts";
import { readTableStream } from "../../lib/series/readTableStream.ts";
import type { BenchRow } from "./benchRow.ts";

const context = { asOf: "2500-01-01T00:00:00Z" };
const encoder = new TextEncoder();

/** A small repeatable generator (Park and Miller 1988); benches need no better one. */
function randomNumbers(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 48_271) % 2_147_483_647;
    return state / 2_147_483_647;
  };
}

const isoDate = (day: number) => new Date(Date.UTC(1900, 0, 1) + day * 86_400_000).toISOString().slice(0, 10);

/** Two columns, one row a day: dates and amounts with two decimals. */
function plainTable(rows: number): string {
  const random = randomNumbers(1);
  const lines = ["date,amount"];
  for (let row = 0; row < rows; row++) lines.push(`${isoDate(row)},${(random() * 1000).toFixed(2)}`);
  return `${lines.join("\n")}\n`;
}

/** Seconds of one core, helper threads included, of the cheapest of several runs: other work on the machine counts less. */
function cheapest(times: number, work: () => unknown): number {
  let best = Number.POSITIVE_INFINITY;
  for (let time = 0; time < times; time++) {
    const before = process.cpuUsage();
    work();
    const { user, system } = process.cpuUsage(before);
    best = Math.min(best, (user + system) / 1e6);
  }
  return best;
}

function rate(name: string, rows: number, seconds: number, peerSeconds: number, goal: string): BenchRow {
  return {
    name,
    value: rows / seconds,
    unit: "rows a second of one core",
    against: `csv-parse, Date.parse and Number: ${(rows / peerSeconds).toFixed(0)}`,
    ratio: peerSeconds / seconds,
    goal,
  };
}

/** The same cells by csv-parse, dates by Date.parse and amounts by Number: no more than a loop of one's own would do. */
function peer(text: string): number {
  let sum = 0;
  for (const [date, amount] of parse(text, { from_line: 2 }) as string[][])
    sum += Date.parse(date) + Number(amount);
  return sum;
}

/** One row a sale in random order, as pieces of 64 KB; nothing but the current piece is held. */
async function* saleRows(rows: number): AsyncGenerator<Uint8Array> {
  const random = randomNumbers(2);
  let piece = "time,branch,amount\n";
  for (let row = 0; row < rows; row++) {
    const day = isoDate(45_000 + Math.floor(random() * 700));
    const hour = String(Math.floor(random() * 24)).padStart(2, "0");
    piece += `${day} ${hour}:${row % 60 < 10 ? "0" : ""}${row % 60},branch ${Math.floor(random() * 500)},${(random() * 90).toFixed(2)}\n`;
    if (piece.length > 65_536) {
      yield encoder.encode(piece);
      piece = "";
    }
  }
  yield encoder.encode(piece);
}

/** A wide table: one row a day, a column a series. */
async function* wideRows(days: number, columns: number): AsyncGenerator<Uint8Array> {
  const random = randomNumbers(3);
  yield encoder.encode(`date,${Array.from({ length: columns }, (_, at) => `series ${at}`).join(",")}\n`);
  for (let day = 0; day < days; day++) {
    const cells = Array.from({ length: columns }, () => Math.floor(random() * 10_000));
    yield encoder.encode(`${isoDate(day)},${cells.join(",")}\n`);
  }
}

/** Seconds of one core, and the largest resident memory of the whole process in MB while the work runs. */
async function peakMemory(work: () => Promise<unknown>): Promise<{ seconds: number; megabytes: number }> {
  let peak = 0;
  const look = () => {
    peak = Math.max(peak, process.memoryUsage.rss());
  };
  const timer = setInterval(look, 20);
  const began = process.cpuUsage();
  await work();
  look();
  clearInterval(timer);
  const { user, system } = process.cpuUsage(began);
  return { seconds: (user + system) / 1e6, megabytes: peak / 1e6 };
}

/** One million random bytes, and as many characters of table-like junk, kind by kind. */
function junk(): Uint8Array[] {
  const random = randomNumbers(4);
  const alphabets = [
    '0123456789-/.,;:|\t\n" #aWQTZ()',
    '",\n',
    "0123456789,\n",
    "1/2/3,\n",
    "Jan 12,;\n",
    "\t|;,",
    "2026-01-01,1\n",
  ];
  const start = encoder.encode("date,v\n2026-01-01,1\n");
  const inputs = alphabets.map((alphabet) => {
    const letters = encoder.encode(alphabet);
    const input = Uint8Array.from(
      { length: 1_000_000 },
      () => letters[Math.floor(random() * letters.length)],
    );
    input.set(start);
    return input;
  });
  return [Uint8Array.from({ length: 1_000_000 }, () => Math.floor(random() * 256)), ...inputs];
}

/** `npm run bench -- reading`: rows a second against csv-parse in the same run, memory on large tables, junk. */
export async function readingBench(): Promise<BenchRow[]> {
  const none = { against: "", ratio: Number.NaN };
  const inputs = junk();
  const restingMemory = process.memoryUsage.rss();
  const junkSeconds = Math.max(...inputs.map((input) => cheapest(1, () => readTable(input, {}, context))));
  const junkMemory = process.resourceUsage().maxRSS / 1000 - restingMemory / 1e6;
  const rows = 200_000;
  const text = plainTable(rows);
  const bytes = encoder.encode(text);
  const ours = () => readTable(bytes, {}, context);
  const seconds = cheapest(7, ours);
  const peerSeconds = cheapest(5, () => peer(text));
  const results = [rate("plain table of two columns", rows, seconds, peerSeconds, ">= 200,000")];

  const sales = 16_000_000;
  const large = await peakMemory(() =>
    readTableStream(saleRows(sales), { every: "day", combine: "sum", seriesName: "branch" }, context),
  );
  results.push(
    {
      name: "600 MB of sales as a stream, 500 series, making them included",
      value: sales / large.seconds,
      unit: "rows a second of one core",
      ...none,
      goal: "",
    },
    {
      name: "600 MB of sales as a stream: peak memory of the process",
      value: large.megabytes,
      unit: "MB",
      ...none,
      goal: "< 512 MB",
    },
  );
  const wide = await peakMemory(() => readTableStream(wideRows(1500, 10_000), {}, context));
  results.push(
    {
      name: "10,000 series of 1,500 days in one wide table: time",
      value: wide.seconds,
      unit: "s",
      ...none,
      goal: "",
    },
    {
      name: "10,000 series of 1,500 days in one wide table: peak memory",
      value: wide.megabytes,
      unit: "MB",
      ...none,
      goal: "< 512 MB",
    },
  );
  results.push(
    { name: "1 MB of junk, the slowest kind", value: junkSeconds, unit: "s", ...none, goal: "< 2 s" },
    { name: "1 MB of junk: memory above rest", value: junkMemory, unit: "MB", ...none, goal: "< 200 MB" },
  );
  return results;
}
