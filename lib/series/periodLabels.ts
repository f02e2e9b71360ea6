import { dayNumber } from "./civil.ts";
import { fullYear } from "./dateCell.ts";
import type { DateFormat } from "./dateFormat.ts";
import type { Period } from "./series.ts";

/**
 * Labels of a calendar of one's own, such as 4-4-5: a year and the number of a period in it (`2026-P03`,
 * `FY26 P3`, `P03/2026`, `2026 3`). The third period of 2026 stands as the third month of 2026 (or quarter, or the
 * year itself): the grid keeps the order and the season, whatever days the period really holds.
 */
export function periodLabels(every: Period): DateFormat {
  const most = every === "quarter" ? 4 : every === "year" ? 1 : 12;
  const grain = every === "quarter" || every === "year" ? every : "month";
  return {
    name: "period-label",
    pattern: every === "year" ? "FY2026" : "2026-P03",
    digitsOnly: false,
    read(text, cell) {
      const yearFirst = /^(?:FY ?)?(\d{4}|(?<=FY ?)\d{2})(?:[-/ ._]*(?:P|M|Q|PD|Period)? ?(\d{1,2}))?$/i.exec(
        text,
      );
      const yearLast = yearFirst
        ? null
        : /^(?:P|M|Q|PD|Period) ?(\d{1,2})[-/ ._,]*(?:FY ?)?(\d{4}|(?<=FY ?)\d{2})$/i.exec(text);
      if (!yearFirst && !yearLast) return false;
      const year = fullYear(yearFirst?.[1] ?? yearLast?.[2] ?? "");
      const number = Number(
        (yearFirst ? yearFirst[2] : yearLast?.[1]) ?? (every === "year" ? 1 : Number.NaN),
      );
      if (!(number >= 1 && number <= most)) return false;
      cell.day = dayNumber(year, (number - 1) * (every === "quarter" ? 3 : 1) + 1, 1);
      cell.clock = -1;
      cell.offset = Number.NaN;
      cell.grain = grain;
      return true;
    },
  };
}
