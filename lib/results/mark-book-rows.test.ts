import { describe, expect, it } from 'vitest'
import { pairRows, type Script, type Student } from './mark-book-rows'

const student = (studentId: string, familyName: string): Student => ({ studentId, candidateNumber: studentId, givenName: 'Ada', familyName, attendance: 'expected' })
const script = (scriptId: string, position: number, studentId: string | null, suggestedStudentId: string | null = null): Script => ({ scriptId, position, studentId, suggestedStudentId })

describe('pairing a class list with its scripts', () => {
  it('keeps register order, accents beside their plain letters', () => {
    const rows = pairRows([student('1', 'Zielinski'), student('2', 'Éva'), student('3', 'Evans')], [])
    expect(rows.map((row) => row.student?.familyName)).toEqual(['Éva', 'Evans', 'Zielinski'])
  })
  it('takes the confirmed script before a suggested one, which then gets a line of its own', () => {
    const rows = pairRows([student('1', 'Abdi')], [script('a', 0, null, '1'), script('b', 1, '1')])
    expect(rows.map((row) => [row.student?.studentId, row.script?.scriptId, row.named])).toEqual([['1', 'b', true], [undefined, 'a', false]])
  })
  it('shows a suggested name as not confirmed, once', () => {
    const rows = pairRows([student('1', 'Abdi'), student('2', 'Byrne')], [script('a', 0, null, '1'), script('b', 1, null, '1')])
    expect(rows.map((row) => [row.script?.scriptId ?? null, row.named])).toEqual([['a', false], [null, true], ['b', false]])
  })
})
