import type { Voice } from "./facts.ts";
import { dateFormat } from "./formats.ts";

/** Dates of runs in the reader's time zone: "30 November 2026". */
export function dateWriter(voice: Voice): (instant: string) => string {
  const format = dateFormat(voice.locale, {
    timeZone: voice.timeZone,
    day: "numeric",
    month: "long",
    year: "numeric",
  });
  return (instant) => format.format(Date.parse(instant));
}

/** The same with the time of day. */
export function timeWriter(voice: Voice): (instant: string) => string {
  const format = dateFormat(voice.locale, {
    timeZone: voice.timeZone,
    day: "numeric",
    month: "long",
    year: "numeric",
    hour: "2-digit",
    minute: "2-digit",
  });
  return (instant) => format.format(Date.parse(instant));
}

/** Where the report of a run can be opened: under the owner's base address, else its key in the store. */
export function reportPlace(asOf: string, voice: Voice): string {
  const key = `runs/${asOf.replace(/\.\d+Z$/, "Z").replaceAll(":", "-")}/report.html`;
  return voice.reportBase === null ? key : `${voice.reportBase.replace(/\/+$/, "")}/${key}`;
}
