import { AppError } from './errors'

/** A whole number of half marks. Marks are never held as decimals. */
export type HalfMarks = number & { readonly halfMarks: unique symbol }
/** The smallest mark difference a paper allows, in halves: 1 is half a mark, 2 a whole one. */
export type MarkingStep = 1 | 2

/** Makes HalfMarks of a whole number of halves; throws bad_input for anything else. */
export function halves(value: number): HalfMarks {
  if (!Number.isSafeInteger(value)) throw new AppError('bad_input', { halves: value })
  return value as HalfMarks
}

/** Makes HalfMarks of marks as files for machines write them (1.5 gives 3 halves); throws bad_input off the half. */
export function halvesOfMarks(marks: number): HalfMarks {
  return halves(marks * 2)
}

/** Marks as files for machines write them: 3 halves give 1.5. */
export function marksOf(value: HalfMarks): number {
  return value / 2
}

/** Adds marks up. An empty list is nought. */
export function sum(values: Iterable<HalfMarks>): HalfMarks {
  let total = 0
  for (const value of values) total += value
  return total as HalfMarks
}

/** A mark as a person reads it: 0, ½, 1, 1½. A lone half has no leading 0. */
export function sayMark(value: HalfMarks): string {
  const sign = value < 0 ? '−' : ''
  const whole = Math.floor(Math.abs(value) / 2)
  const half = Math.abs(value) % 2 === 1
  if (!half) return `${sign}${whole}`
  return `${sign}${whole === 0 ? '' : whole}½`
}

/** Reads a mark a person typed: "1½", "½", "1.5", "1,5", "7". Null when it is none. */
export function readMark(text: string): HalfMarks | null {
  const match = /^\s*(\d*)(?:(½)|[.,]([05]))?\s*$/.exec(text)
  if (!match || (match[1] === '' && !match[2])) return null
  const half = match[2] !== undefined || match[3] === '5'
  return (Number(match[1] || 0) * 2 + (half ? 1 : 0)) as HalfMarks
}

/** Whether a mark lies on the paper's step. */
export function onStep(value: HalfMarks, step: MarkingStep): boolean {
  return value % step === 0
}

/** Percent of a maximum, computed once from whole numbers, half up, for show only (check-values: percent-half-up). */
export function percent(mark: HalfMarks, maximum: HalfMarks): number {
  return Math.floor((200 * mark + maximum) / (2 * maximum))
}
