import type { ChangeKind } from "./notice.ts";

/**
 * How the false-alarm rate is spent over the kinds, one being an equal part: a level costs most to see and is what
 * readers ask about first, larger shocks are seen sooner.
 */
const parts: Partial<Record<ChangeKind, number>> = { level: 1.2, "shock-size": 0.9 };

export const spendingOf = (kind: ChangeKind): number => parts[kind] ?? 1;
