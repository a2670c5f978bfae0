/** The end-of-keeping date: `months` after a date, both as year-month-day; the last day of a shorter month stands for a day it lacks. */
export function keepUntil(from: string, months: number): string {
  const [year, month, day] = from.split('-').map(Number) as [number, number, number]
  const last = new Date(Date.UTC(year, month - 1 + months + 1, 0))
  last.setUTCDate(Math.min(day, last.getUTCDate()))
  return last.toISOString().slice(0, 10)
}
