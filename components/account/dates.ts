const DAY_MS = 86_400_000
/** Nights count, so a day begins and ends at noon on board: an hour of summer time more or less changes none. */
const NOON_MS = DAY_MS / 2

/** The noon of a calendar date on board: `noonOf('2026-12-01', 3600) // "2026-12-01T11:00:00.000Z"`. */
export const noonOf = (date: string, utcOffsetSeconds: number): string =>
  new Date(Date.parse(`${date}T00:00:00Z`) + NOON_MS - utcOffsetSeconds * 1000).toISOString()

/** The calendar date on board of an instant, `2026-12-01`. */
export const dateOf = (at: number | string, utcOffsetSeconds: number): string =>
  new Date((typeof at === 'number' ? at : Date.parse(at)) + utcOffsetSeconds * 1000)
    .toISOString()
    .slice(0, 10)
