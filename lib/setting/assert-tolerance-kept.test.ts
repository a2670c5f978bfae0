import { describe, expect, it } from 'vitest'
import { AppError } from '@/lib/core/errors'
import { halves } from '@/lib/core/marks'
import type { Question } from '@/lib/core/paper'
import type { Setting, SettingQuestion } from '@/lib/core/setting'
import { assertToleranceKept } from './assert-tolerance-kept'

const question = (id: string, tolerance: number | null) => ({ id, label: id, tolerance: tolerance === null ? null : halves(tolerance) })
const stored = { tolerance: halves(1), questions: [question('1', null), question('2', 2)] as unknown as Question[] }
const next = (tolerance: number, ...questions: ReturnType<typeof question>[]): Setting => ({ step: 1, tolerance: halves(tolerance), boxes: [], questions: questions as unknown as SettingQuestion[] })
const faults = (setting: Setting): unknown => {
  try {
    assertToleranceKept(stored, setting)
    return null
  } catch (error) {
    return error instanceof AppError ? [error.code, (error.detail.lines as readonly { path: string }[]).map(({ path }) => path)] : error
  }
}

describe('the tolerance after a sample was drawn', () => {
  it('may be written otherwise as long as it stays what it is, and a new question brings its own', () => {
    expect(faults(next(1, question('1', null), question('2', 2)))).toBe(null)
    expect(faults(next(1, question('1', 1), question('2', 2), question('3', 8)))).toBe(null)
    expect(faults(next(1, question('2', 2)))).toBe(null)
  })
  it('is neither widened nor narrowed, for the paper or for a question', () => {
    expect(faults(next(2, question('1', null), question('2', 2)))).toEqual(['tolerance_fixed', ['Paper']])
    expect(faults(next(1, question('1', 2), question('2', 2)))).toEqual(['tolerance_fixed', ['Question 1']])
    expect(faults(next(1, question('1', null), question('2', 1)))).toEqual(['tolerance_fixed', ['Question 2']])
    expect(faults(next(1, question('1', null), question('2', null)))).toEqual(['tolerance_fixed', ['Question 2']])
    expect(faults(next(0, question('1', 0), question('2', 0)))).toEqual(['tolerance_fixed', ['Paper', 'Question 1', 'Question 2']])
  })
})
