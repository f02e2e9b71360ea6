/**
 * The wait a `Retry-After` header asks for, in milliseconds (RFC 9110, 10.2.3): seconds (some receivers add a
 * fraction), or a date, from which `now` (milliseconds) is taken. `undefined` for no header and for what is neither.
 *
 * @example retryAfter("120", 0) // 120000
 * @example retryAfter("Wed, 21 Oct 2015 07:28:00 GMT", Date.UTC(2015, 9, 21, 7, 27)) // 60000
 */
export function retryAfter(header: string | undefined, now: number): number | undefined {
  const text = header?.trim() ?? "";
  if (/^\d{1,10}(\.\d+)?$/.test(text)) return Math.ceil(Number(text) * 1000);
  // All three date forms of RFC 9110 begin with the name of a day; `Date.parse` alone would take "-5" for a year.
  if (!/^(Mon|Tue|Wed|Thu|Fri|Sat|Sun)[a-z]*,? /.test(text)) return undefined;
  // The oldest form (asctime) names no zone and means UTC.
  const date = Date.parse(/GMT$/.test(text) ? text : `${text} GMT`);
  return Number.isNaN(date) ? undefined : Math.max(0, date - now);
}
