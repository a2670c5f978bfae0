import Papa from 'papaparse'
import { describe, expect, it } from 'vitest'
import type { MarkBookCell, MarkBookRow } from '@/lib/core/mark-book'
import { halves } from '@/lib/core/marks'
import { markBookCsv } from './mark-book-csv'

const cell = (state: MarkBookCell['state'], mark: number | null, nothingWritten = false): MarkBookCell =>
  ({ responseId: 'r', state, mark: mark === null ? null : halves(mark), nothingWritten, secondMarked: false, agreed: false, flagged: false, adjusted: false })
const row = (over: Partial<MarkBookRow>): MarkBookRow => ({
  key: 'k', scriptId: 's', scriptNumber: 1, studentId: 't', candidateNumber: '0042', familyName: 'Abdi', givenName: 'Zoë', named: true, attendance: 'expected',
  cells: [], total: { raw: halves(3), adjusted: halves(3), final: halves(3), maximum: halves(9), toCome: 1 }, grade: null, ...over,
})
const questions = ['1a', '1b', '2'].map((label) => ({ id: label, label, maximum: halves(3), withdrawn: null }))

describe('the mark book as a file for a spreadsheet', () => {
  it('writes halves as decimals and keeps nought, nothing written and unmarked apart', () => {
    const [, line] = Papa.parse<string[]>(markBookCsv({ questions, rows: [row({ cells: [cell('marked', 3), cell('marked', 0, true), cell('unmarked', null)] })] }).slice(1)).data
    expect(line).toEqual(['0042', 'Abdi', 'Zoë', 'expected', '1.5', 'nr', '', '1.5', '1', '4.5', ''])
    const [, zero] = Papa.parse<string[]>(markBookCsv({ questions, rows: [row({ cells: [cell('marked', 0), null, cell('missing', null)] })] }).slice(1)).data
    expect(zero?.slice(4, 7)).toEqual(['0', '', ''])
  })
  it.each(['=HYPERLINK("x")', '+1', '-1', '@SUM(A1)', '\t=1'])('does not let %j run as a formula', (name) => {
    const [, line] = Papa.parse<string[]>(markBookCsv({ questions: [], rows: [row({ familyName: name })] }).slice(1)).data
    expect(line?.[1]).toBe(`'${name}`)
  })
  it('begins with a byte order mark so that names keep their accents', () => {
    expect(markBookCsv({ questions, rows: [] }).startsWith('\uFEFFcandidate_number,')).toBe(true)
  })
})
