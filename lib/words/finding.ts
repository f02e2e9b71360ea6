import type { Behaviour, ChangeKind, Evidence } from "../drift/notice.ts";
import type { ForecastNote } from "../forecast/forecast.ts";

/** What is worth saying about one series, as coded data. Sentences are made from it in this room alone. */
export type Finding =
  | {
      readonly code: "change";
      readonly kind: ChangeKind;
      readonly alternative: ChangeKind | null;
      readonly status: "provisional" | "confirmed";
      /** Still told: for some periods after its notice. Whether a run is the first to tell it, `freshness.ts` says. */
      readonly fresh: boolean;
      readonly noticed: string;
      /** Noticed only when the past was looked back on: no run of that time told it. */
      readonly lookedBack?: boolean;
      readonly change: { readonly period: string; readonly low: string; readonly high: string };
      readonly before: Behaviour;
      readonly after: Behaviour;
      readonly evidence: Evidence;
    }
  | {
      readonly code: "surprise";
      readonly period: string;
      readonly value: number;
      readonly expected: number;
      readonly size: number;
      /** What is left of it so many periods later, in the unit of the series. */
      readonly remaining: readonly {
        readonly after: number;
        readonly period: string;
        readonly amount: number;
      }[];
    }
  | {
      readonly code: "past-break";
      readonly change: { readonly period: string; readonly low: string; readonly high: string };
      readonly levelBefore: number;
      readonly levelAfter: number;
      readonly pValue: number;
    }
  | { readonly code: "forecast-note"; readonly note: ForecastNote }
  | { readonly code: "no-new-values"; readonly since: string }
  | { readonly code: "stale"; readonly lastPeriod: string; readonly periodsLate: number }
  | {
      readonly code: "revised";
      readonly count: number;
      readonly firstPeriod: string;
      readonly largest: {
        readonly period: string;
        readonly before: number | null;
        readonly after: number | null;
      };
    }
  | { readonly code: "incomplete-period"; readonly period: string }
  | { readonly code: "gaps"; readonly count: number; readonly latest: string }
  | {
      readonly code: "event-effect";
      readonly name: string;
      readonly effect: number;
      readonly standardError: number;
      /** What it adds to coming periods. */
      readonly coming: readonly { readonly period: string; readonly amount: number }[];
    };
