import { describe, expect, it } from 'vitest'
import { halves, halvesOfMarks, percent } from './marks'
import { eightPointScale, halfwayScale, letterScale } from './scale-suggestions'
import { checkValue } from '@/tests/make/check-value'
import { gradeOf } from './grade-of'

describe('grades', () => {
  it('gives 8 for 10 of 10, 7 for 9, 6 for 8 and so on down, after an odd half went up (common practice, no source)', () => {
    const scale = eightPointScale(halvesOfMarks(10))
    const grade = (marks: number) => gradeOf(scale, halvesOfMarks(marks))
    expect([10, 9, 8, 7, 6, 5, 4, 3, 2, 1, 0].map(grade)).toEqual(['8', '7', '6', '5', '4', '3', '2', '1', '1', '1', '1'])
    expect([9.5, 8.5, 7.5, 4.5, 3.5, 0.5].map(grade)).toEqual(['8', '7', '6', '3', '2', '1'])
  })
  it('keeps the equal steps on papers with other maxima, in whole marks', () => {
    expect(eightPointScale(halvesOfMarks(20)).boundaries.map(({ lowest }) => lowest / 2)).toEqual([20, 18, 16, 14, 12, 10, 8, 0])
    const odd = eightPointScale(halvesOfMarks(19.5))
    expect(odd.boundaries.map(({ lowest }) => lowest / 2)).toEqual([19.5, 18, 16, 14, 12, 10, 8, 0])
    expect([19.5, 19].map((marks) => gradeOf(odd, halvesOfMarks(marks)))).toEqual(['8', '7'])
  })
  it('counts the boundary mark in the grade', () => {
    const scale = letterScale(halvesOfMarks(20))
    expect(gradeOf(scale, halvesOfMarks(16))).toBe('A')
    expect(gradeOf(scale, halvesOfMarks(15.5))).toBe('B')
    expect(gradeOf(halfwayScale(halvesOfMarks(15)), halvesOfMarks(7.5))).toBe('Reached')
    expect(gradeOf(halfwayScale(halvesOfMarks(15)), halvesOfMarks(7))).toBe('Not yet')
  })
  it('compares only after the odd half was kept, put up or put down', () => {
    const boundaries = [{ grade: 'A', lowest: halvesOfMarks(8) }, { grade: 'B', lowest: halvesOfMarks(7) }]
    const grades = (['kept', 'up', 'down'] as const).map((oddHalf) => gradeOf({ oddHalf, boundaries }, halvesOfMarks(7.5)))
    expect(grades).toEqual(['B', 'A', 'B'])
    expect(gradeOf({ oddHalf: 'down', boundaries: [{ grade: 'A', lowest: halvesOfMarks(7.5) }] }, halvesOfMarks(7.5))).toBeNull()
  })
  it('has no grade without a scale, nor below every boundary', () => {
    expect(gradeOf({ oddHalf: 'kept', boundaries: [] }, halves(4))).toBeNull()
    expect(gradeOf({ oddHalf: 'kept', boundaries: [{ grade: 'A', lowest: halves(4) }] }, halves(3))).toBeNull()
  })
})

describe('percentages (check-values: percent-half-up)', () => {
  const { data, expected } = checkValue<{ markAndMax: [number, number][] }, { percent: number[] }>('percent-half-up')
  it('are rounded once, half up, from whole numbers', () => {
    expect(data.markAndMax.map(([mark, max]) => percent(halvesOfMarks(mark), halvesOfMarks(max)))).toEqual(expected.percent)
  })
})
