import { describe, expect, it } from 'vitest'
import { halves } from '@/lib/core/marks'
import type { Question } from '@/lib/core/paper'
import type { Setting } from '@/lib/core/setting'
import { checkSetting } from './check-setting'
import { mergePaperFile } from './merge-paper-file'
import { paperSizeOf } from './paper-size'
import { planChanges, type Touched } from './plan-changes'

const nothing: Touched = { questions: new Set(), points: new Set(), given: new Map(), oddHalves: false }

function question(id: string, label: string, worths: readonly number[]): Question {
  return {
    id, label, position: 0, maximum: halves(worths.reduce((a, b) => a + b, 0)), text: '', answer: '', modelSolution: '', schemeNote: '', tolerance: null, withdrawn: null,
    spaces: [{ id: `${id}-s`, page: 1, rect: { x: 10, y: 10, w: 100, h: 50 } }],
    points: worths.map((worth, k) => ({ id: `${id}-p${k}`, label: `point ${k}`, worth: halves(worth), kind: null, dependsOn: null, note: '', withdrawn: false })),
  }
}
const setting = (questions: readonly Question[], more: Partial<Setting> = {}): Setting => ({ step: 1, tolerance: halves(1), boxes: [], questions: [...questions], ...more })
const one = question('a', '1', [1, 2])
const two = question('b', '2', [2])

describe('planning changes', () => {
  it('lists what goes and leaves what stays', () => {
    const changed = { ...one, points: one.points.slice(0, 1), spaces: [], maximum: halves(1) }
    expect(planChanges([one, two], setting([changed]), nothing)).toEqual({ dropQuestions: ['b'], dropPoints: ['a-p1'], dropSpaces: ['a-s'] })
  })

  it('never deletes a question or a point with stamps', () => {
    expect(() => planChanges([one, two], setting([one]), { ...nothing, questions: new Set(['b']) })).toThrow('has_stamps')
    const fewer = { ...one, points: one.points.slice(0, 1) }
    expect(() => planChanges([one], setting([fewer]), { ...nothing, points: new Set(['a-p1']) })).toThrow('has_stamps')
    expect(planChanges([one], setting([fewer]), { ...nothing, points: new Set(['a-p0']) }).dropPoints).toEqual(['a-p1'])
  })

  it('does not let the most fall under what was given, nor the step rise over a half that was', () => {
    const given = new Map([['a', halves(3)]])
    expect(() => planChanges([one], setting([{ ...one, maximum: halves(2) }]), { ...nothing, given })).toThrow('has_stamps')
    expect(planChanges([one], setting([{ ...one, maximum: halves(3) }]), { ...nothing, given })).toBeTruthy()
    expect(() => planChanges([two], setting([two], { step: 2 }), { ...nothing, oddHalves: true })).toThrow('has_stamps')
  })
})

describe('a file over a paper', () => {
  const file = setting([question('x', '1', [1, 2]), question('y', '3', [1])])

  it('keeps ids by label and replaces the rest while nothing is marked', () => {
    const merged = mergePaperFile([one, two], file, false)
    expect(merged.questions.map(({ id }) => id)).toEqual(['a', 'y'])
    expect(merged.questions[0]!.points.map(({ id }) => id)).toEqual(['a-p0', 'a-p1'])
    expect(merged.questions[0]!.spaces[0]!.id).toBe('a-s')
  })

  it('with stamps refuses to leave anything out, except what is withdrawn', () => {
    expect(() => mergePaperFile([one, two], file, true)).toThrow('has_stamps')
    const kept = mergePaperFile([one, { ...two, withdrawn: { as: 'out', reason: 'misprint' } }], file, true)
    expect(kept.questions.map(({ id }) => id)).toEqual(['a', 'y', 'b'])
  })

  it('carries a dependency over to the ids that stay', () => {
    const first = file.questions[0]!
    const points = [first.points[0]!, { ...first.points[1]!, dependsOn: first.points[0]!.id }]
    expect(mergePaperFile([one], { ...file, questions: [{ ...first, points }] }, true).questions[0]!.points[1]!.dependsOn).toBe('a-p0')
  })
})

describe('checking', () => {
  const pages = [{ page: 1, width: 200, height: 100 }]
  it('lets a withdrawn point be counted in or out of the most', () => {
    const out = { ...one, maximum: halves(1) }
    expect(checkSetting(setting([out]), pages)).toHaveLength(1)
    expect(checkSetting(setting([out]), pages, new Set(['a-p1']))).toEqual([])
    expect(checkSetting(setting([one]), pages, new Set(['a-p1']))).toEqual([])
  })

  it('finds a circle of three and an empty label', () => {
    const three = question('c', '', [1, 1, 1])
    const points = three.points.map((point, k) => ({ ...point, dependsOn: `c-p${(k + 1) % 3}` }))
    expect(checkSetting(setting([{ ...three, points }]), pages).map(({ key }) => key)).toEqual(['label', 'depends_on', 'depends_on', 'depends_on'])
  })

  it('knows the sheets it takes, upright and lying', () => {
    expect([[595, 842], [792, 612], [842, 1191], [842, 595], [500, 700]].map(([width, height]) => paperSizeOf({ width: width!, height: height! }))).toEqual(['A4', 'Letter', 'A3', 'A4', null])
  })
})
