import type { Progress } from "../lib/job/progress.ts";
import type { RunSummary } from "../lib/job/summary.ts";
import type { Message } from "../lib/webhook/message.ts";

export function say(...lines: readonly string[]): void {
  process.stdout.write(`${lines.join("\n")}\n`);
}

/** A progress line that rewrites itself on a terminal, and plain lines (few) elsewhere. */
export function progressLine(): (progress: Progress) => void {
  const terminal = process.stderr.isTTY === true;
  let tenths = -1;
  return (progress) => {
    const what = progress.stage === "run" ? `run of ${progress.asOf.slice(0, 10)}` : progress.table;
    const text = `${progress.done} of ${progress.of}  ${what}`;
    if (terminal) {
      const end = progress.done === progress.of ? "\n" : "";
      process.stderr.write(`\r\u001b[2K${text}${end}`);
      return;
    }
    const now = Math.floor((10 * progress.done) / progress.of);
    if (now === tenths) return;
    tenths = now;
    process.stderr.write(`${text}\n`);
  };
}

/** A message as chat would show it. */
export function messageText(message: Message): string {
  return [message.title, "", ...message.lines, "", message.footer].join("\n");
}

/** What a run did, for the person who started it. */
export function summaryLines(summary: RunSummary, where: string): string[] {
  const count = (amount: number, one: string, many = `${one}s`) => `${amount} ${amount === 1 ? one : many}`;
  const lines = [
    `${count(summary.tables, "table")}, ${count(summary.series, "series", "series")}, ${count(summary.notices, "notice")} of change, ${count(summary.surprises, "surprise")}`,
  ];
  for (const { table, problems } of summary.failed)
    for (const problem of problems)
      lines.push(
        `failed: ${table}${problem.line ? `, line ${problem.line}` : ""}: ${problem.message}; ${problem.remedy}`,
      );
  for (const table of summary.left) lines.push(`not reached: ${table}`);
  for (const table of summary.gone ?? []) lines.push(`not there any more: ${table}`);
  for (const delivery of summary.deliveries)
    lines.push(
      `${delivery.webhook} (${delivery.audience})${delivery.asOf === summary.asOf ? "" : `, the note of ${delivery.asOf}`}: ${delivery.status.replaceAll("-", " ")}${delivery.reason ? `: ${delivery.reason}` : ""}`,
    );
  lines.push(`report: ${where}/${summary.report}`);
  return lines;
}

export function exitCodeOf(summary: RunSummary): number {
  // Without a table the store is most often the wrong one, or its tables lie elsewhere.
  if (summary.tables + summary.failed.length + summary.left.length === 0) return 2;
  if (summary.failed.length > 0 || summary.left.length > 0) return 1;
  return summary.deliveries.some(
    (delivery) => delivery.status === "undelivered" || delivery.status === "not-configured",
  )
    ? 3
    : 0;
}
