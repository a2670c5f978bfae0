import { sayMark, type HalfMarks } from './marks'
import type { AgreementFigures, DecisionReason, DrawnAs, Stands } from './second-marking'

/** A difference in halves as it is read: "0", "+½", "−1". */
export function sayDifference(difference: number): string {
  return `${difference > 0 ? '+' : ''}${sayMark(difference as HalfMarks)}`
}

/** "1 mark apart, outside the tolerance of ½". */
export function sayApart(first: HalfMarks, second: HalfMarks, tolerance: HalfMarks): string {
  const apart = Math.abs(first - second)
  if (apart === 0) return 'The same mark'
  return `${sayMark(apart as HalfMarks)} ${apart <= 2 ? 'mark' : 'marks'} apart, ${apart <= tolerance ? 'inside' : 'outside'} the tolerance of ${sayMark(tolerance)}`
}

/** The mean of first minus second in marks, with its sign; a statistic, so it is a decimal. */
export function sayMean(meanDifference: number | null): string {
  if (meanDifference === null) return '–'
  const marks = (meanDifference / 2).toFixed(2)
  return Number(marks) === 0 ? '0.00' : marks.startsWith('-') ? `−${marks.slice(1)}` : `+${marks}`
}

/** The caution a figure of few pairs carries. */
export function sayCaution({ n, few }: Pick<AgreementFigures, 'n' | 'few'>): string | null {
  return n > 0 && few ? `n = ${n}: too few to judge the marker.` : null
}

export const sayReason: Readonly<Record<DecisionReason, string>> = {
  judgement: 'Difference of judgement', scheme_misapplied: 'Scheme misapplied', not_foreseen: 'Answer not foreseen by the scheme', totalling: 'Totalling', work_missed: 'Page or work missed',
  other_place: 'Answer in another place', scan_fault: 'Scan fault', keying: 'Keying', transfer: 'Transfer', unreadable: 'Unreadable writing', malpractice: 'Malpractice outcome', other: 'Other',
}

/** A stored reason in words; an agreed mark settled at the desk has given none yet. */
export function reasonWords(reason: string): string {
  return sayReason[reason as DecisionReason] ?? 'no reason given yet'
}

export const sayStands: Readonly<Record<Stands, string>> = { first: 'First mark stands', second: 'Second mark stands', agreed: 'Agreed mark' }

export const sayDrawnAs: Readonly<Record<DrawnAs, string>> = { highest: 'highest', lowest: 'lowest', spread: 'by lot', added: 'added' }
