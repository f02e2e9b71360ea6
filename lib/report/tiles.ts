import { lastPersistenceChange } from "../words/changeWords.ts";
import type { ModelFacts } from "../words/facts.ts";
import { toldFading } from "../words/fading.ts";
import { hasTotal, limitStep } from "../words/forecastSentences.ts";
import { allWhole, roundingStep } from "../words/numbers.ts";
import { anOrA, countOf } from "../words/spans.ts";
import { type Speech, spokenInterval } from "../words/speech.ts";
import { html, type Markup } from "./markup.ts";

/** The numbers to plan with, large: the next period, the whole horizon, and the chance of passing each limit. */
export function tiles(speech: Speech): Markup {
  const { forecast, history, period, model } = speech.facts;
  const next = spokenInterval(forecast.intervals);
  const total = spokenInterval(forecast.total.intervals);
  const totalStep = roundingStep(total.high - total.low, allWhole(history.values));
  const range = (low: number, high: number, step: number) =>
    `${speech.write(low, step)} to ${speech.write(high, step)}`;
  const unit = speech.unit ?? "";
  const change = lastPersistenceChange(speech.facts);
  const life = (value: number | null) =>
    value === null ? "never" : speech.span(value).replace(/^about /, "");
  const [half, beneath] = change
    ? [
        life(change.after.halfLife),
        `since ${speech.periods.inText(change.change.period)}; before, ${life(change.before.halfLife)}`,
      ]
    : [toldFading(model).hasHalfLife ? life(model.halfLife) : "not known", fading(model)];
  const horizon = countOf(forecast.periods.length, period, speech.write);
  return html`<dl class="tiles">
<div><dt>${capital(speech.periods.name(forecast.periods[0]))}</dt><dd><b>${speech.write(forecast.point[0], speech.forecastStep)}</b> ${unit}<small>${range(next.low[0], next.high[0], speech.forecastStep)}</small></dd></div>
${hasTotal(speech.facts) ? html`<div><dt>All ${horizon}</dt><dd><b>${speech.write(forecast.total.point, totalStep)}</b> ${unit}<small>${range(total.low, total.high, totalStep)}</small></dd></div>` : html``}
<div><dt>A shock loses half in</dt><dd><b>${half}</b><small>${beneath}</small></dd></div>
${forecast.chances.map((one) => html`<div><dt>Chance of ${anOrA(period)} ${period} ${one.direction} ${speech.write(one.limit, limitStep(one.limit))}</dt><dd><b>${speech.chance(one.any).replace(/^about /, "")}</b><small>within ${horizon}</small></dd></div>`)}
</dl>`;
}

const fading = (model: ModelFacts) =>
  ({
    fades: "the data say that it fades",
    swings: "it swings back; the data do not say how soon that ends",
    permanent: "it may well be permanent",
    "cannot-tell": "the data cannot tell whether it fades",
  })[toldFading(model).verdict];

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
