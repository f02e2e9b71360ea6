import { numberFormat } from "./formats.ts";

/**
 * A chance in percent, to the nearest 5 between 5 and 95 and to the nearest 1 outside, since a forecast knows no more.
 *
 * @example chanceWriter("en-GB")(0.183) // "about 20%"
 */
export function chanceWriter(locale: string): (chance: number) => string {
  const format = numberFormat(locale, { style: "percent", maximumFractionDigits: 0 });
  return (chance) => {
    if (!(chance >= 0.005)) return `under ${format.format(0.01)}`;
    if (chance > 0.995) return `over ${format.format(0.99)}`;
    const step = chance < 0.05 || chance > 0.95 ? 100 : 20;
    return `about ${format.format(Math.round(chance * step) / step)}`;
  };
}

/** A share that is meant exactly, such as the level of a range: "80%". */
export function percentWriter(locale: string): (percent: number) => string {
  const format = numberFormat(locale, { style: "percent", maximumFractionDigits: 1 });
  return (percent) => format.format(percent / 100);
}
