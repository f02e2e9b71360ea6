import * as z from "zod/mini";

// What the schemas of our documents are put together from.

export const say = (text: string) => z.describe(text);
export const numbers = z.array(z.number());
export const orNull = z.nullable(z.number());
export const instant = z.string().check(say("ISO instant, 2026-11-30T06:00:00Z."));
export const period = z.string().check(say("ISO date, or instant for hours, at which the period starts."));
