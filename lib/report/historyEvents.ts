import { changeHeadline } from "../words/changeWords.ts";
import { valueStep } from "../words/otherFindings.ts";
import type { Speech } from "../words/speech.ts";
import { html, type Markup } from "./markup.ts";
import { type Mark, side } from "./plot.ts";
import type { Timeline } from "./timeline.ts";

/** Something that happened at one period: a letter above the picture, a shape in it, a value to ring. */
interface ChartEvent {
  readonly index: number;
  readonly value: number | null;
  readonly mark: Mark;
  readonly shape: (x: (index: number) => number) => Markup;
}

/** Changes (a band over the interval of the date) and surprises (a ring), in the order of time. */
export function eventsOf(speech: Speech, { starts, past }: Timeline): ChartEvent[] {
  const last = starts.length - 1;
  const place = (period: string) => {
    const found = starts.findIndex((start) => start >= period);
    return found === -1 ? last : found;
  };
  const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
  return speech.facts.findings
    .flatMap((finding): ChartEvent[] => {
      if (finding.code === "change" || finding.code === "past-break") {
        if (finding.change.high < starts[0]) return [];
        const at = place(finding.change.period);
        const [low, high] = [place(finding.change.low), place(finding.change.high)];
        const text =
          finding.code === "change"
            ? `${capital(speech.periods.name(finding.change.period))}: ${changeHeadline(finding, speech)}.`
            : `${capital(speech.periods.name(finding.change.period))}: a past step of the usual level.`;
        return [
          {
            index: at,
            value: null,
            mark: { at: at / last, text },
            shape: (x) =>
              html`<path class="between" d="M${x(low)},0H${Math.max(x(high), x(low) + 2)}V${side}H${x(low)}Z"/><path class="change" d="M${x(at)},0V${side}"/>`,
          },
        ];
      }
      if (finding.code !== "surprise") return [];
      const index = starts.indexOf(finding.period);
      if (index === -1 || index >= past.length) return [];
      const than = `expected about ${speech.roughNumber(finding.expected)}`;
      const text = `${capital(speech.periods.name(finding.period))}: a one-off surprise of ${speech.amount(finding.value, valueStep(finding.value))}, ${than}.`;
      return [{ index, value: past[index], mark: { at: index / last, text }, shape: () => html`` }];
    })
    .sort((one, other) => one.index - other.index)
    .slice(-8);
}
