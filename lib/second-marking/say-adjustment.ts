import { sayMark, type HalfMarks } from '@/lib/core/marks'
import { sayDay } from '@/lib/core/say-day'

/** What a returned script says of an adjustment, after the question's name: no marker is named to a student. `at` in milliseconds. */
export function sayAdjustment(halves: number, at: number): string {
  const by = `${sayMark(Math.abs(halves) as HalfMarks)} ${Math.abs(halves) <= 2 ? 'mark' : 'marks'}`
  return `${halves > 0 ? 'raised' : 'lowered'} by ${by} after second marking, ${sayDay(new Date(at).toISOString().slice(0, 10))}`
}
