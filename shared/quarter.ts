const QUARTER_MS = 15 * 60_000

/**
 * The quarter of an hour at or after an instant, for sentences such as "by about 00:30": while people are up no
 * minute can be named, and the end of a span must not be rounded to before it.
 * @param at epoch milliseconds.
 * @example quarterAfter(Date.parse('2026-12-01T23:47:10Z')) // 2026-12-02T00:00:00Z
 */
export const quarterAfter = (at: number): number => Math.ceil(at / QUARTER_MS) * QUARTER_MS
