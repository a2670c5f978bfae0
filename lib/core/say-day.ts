const day = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC' })

/** A date as people write it: 2026-11-12 is "12 November 2026". */
export function sayDay(date: string): string {
  return day.format(new Date(`${date}T00:00:00Z`))
}

/** A moment in milliseconds as its day: "12 November 2026". */
export function sayInstant(at: number): string {
  return day.format(at)
}
