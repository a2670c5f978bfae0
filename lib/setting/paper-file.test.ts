import { readFileSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, it } from 'vitest'
import { AppError, type ErrorLine } from '@/lib/core/errors'
import { halves } from '@/lib/core/marks'
import type { Paper } from '@/lib/core/paper'
import { readPaperFile, type ReadPaper } from './read-paper-file'
import { writePaperFile } from './write-paper-file'

type Json = Record<string, unknown>
const sets = ['everyday', 'one-page', 'bitonal', 'booklet']
const fileOf = (name: string): Json => JSON.parse(readFileSync(path.join(import.meta.dirname, '../../seeds/class-sets', name, 'paper.json'), 'utf8')) as Json
/** The keys that describe a paper: answers of the made-up students are not part of one. */
const describing = (file: Json): Json => ({ ...file, questions: (file.questions as Json[]).map(({ areas: _areas, sample_responses: _samples, ...question }) => question) })

function paperOf(read: ReadPaper): Paper {
  return {
    id: 'p', title: read.title, blankFileId: null, step: read.setting.step, tolerance: read.setting.tolerance, sampleSize: read.sampleSize ?? null, namesHidden: read.namesHidden ?? true,
    schemeVersion: 1, solutionsReleased: read.solutionsReleased ?? true, keepUntil: '2028-01-31', createdAt: 0, archivedAt: null, pages: read.pages, boxes: read.setting.boxes,
    questions: read.setting.questions.map((question, position) => ({ ...question, position, withdrawn: null, points: question.points.map((point) => ({ ...point, withdrawn: false })) })),
    scale: read.scale ?? { oddHalf: 'kept', boundaries: [] },
  }
}

function faults(file: unknown, pages?: Parameters<typeof readPaperFile>[1]): readonly ErrorLine[] {
  try {
    readPaperFile(file, pages)
  } catch (error) {
    expect((error as AppError).code).toBe('paper_invalid')
    return (error as AppError).detail.lines as readonly ErrorLine[]
  }
  return []
}

describe('paper.json', () => {
  it.each(sets)('reads %s and writes the same paper again', (name) => {
    const file = fileOf(name)
    const written = writePaperFile(paperOf(readPaperFile(file)))
    expect(written).toMatchObject(describing(file))
    expect(written.format).toBe(1)
  })

  it.each(sets)('reads what it wrote of %s to the same value', (name) => {
    const once = writePaperFile(paperOf(readPaperFile(fileOf(name))))
    expect(writePaperFile(paperOf(readPaperFile(JSON.parse(JSON.stringify(once)))))).toEqual(once)
  })

  it('keeps all our own keys on the way out and in', () => {
    const read = readPaperFile(fileOf('everyday'))
    const paper = paperOf(read)
    const question = paper.questions[0]!
    const [first, second] = question.points
    const rich: Paper = {
      ...paper, step: 1, tolerance: halves(2), sampleSize: 12, namesHidden: false, solutionsReleased: false,
      pages: [paper.pages[0]!, { page: 2, width: 841.89, height: 1190.55 }],
      scale: { oddHalf: 'up', boundaries: [{ grade: '7', lowest: halves(29) }] },
      questions: [{
        ...question, text: 'Work out 15% of 240.', modelSolution: '10% is 24', schemeNote: 'oe', tolerance: halves(0),
        spaces: [...question.spaces, { id: 'more', page: 2, rect: { x: 10, y: 10, w: 100, h: 50 } }],
        points: [{ ...first!, kind: 'M', note: 'or 0.15' }, { ...second!, kind: 'A', dependsOn: first!.id }],
      }],
    }
    const file = JSON.parse(JSON.stringify(writePaperFile(rich))) as Json
    const again = paperOf(readPaperFile(file))
    expect(writePaperFile(again)).toEqual(writePaperFile(rich))
    expect(again.questions[0]!.points[1]!.dependsOn).toBe(again.questions[0]!.points[0]!.id)
    expect(again.scale.boundaries[0]!.lowest).toBe(29)
  })

  it('leaves out what was withdrawn', () => {
    const paper = paperOf(readPaperFile(fileOf('everyday')))
    const [first, ...rest] = paper.questions
    const written = writePaperFile({ ...paper, questions: [{ ...first!, withdrawn: { as: 'out', reason: 'misprint' } }, ...rest] })
    expect(written.questions!.map(({ label }) => label)).not.toContain('1a')
  })
})

describe('faults of a paper.json, by path', () => {
  const everyday = describing(fileOf('everyday'))
  const withQuestion = (change: Json, at = 0): Json => ({ ...everyday, questions: (everyday.questions as Json[]).map((question, k) => (k === at ? { ...question, ...change } : question)) })

  it.each([
    ['a space over the edge', withQuestion({ region: { x: 500, y: 100, w: 200, h: 50 } }), 'questions[0].region', 'edge of page 1'],
    ['a space on a page that is not there', withQuestion({ page: 3 }), 'questions[0].region', 'page 3'],
    ['a repeated label', withQuestion({ label: '1A' }, 1), 'questions[1].label', 'more than once'],
    ['points that do not add up', withQuestion({ max_marks: 2 }), 'questions[0].mark_points', 'add up to 1½'],
    ['marks off the half', withQuestion({ max_marks: 1.3 }), 'questions[0].max_marks', 'half marks'],
    ['half marks in a paper of whole marks', { ...everyday, marking_step: 1 }, 'questions[0].max_marks', 'whole marks'],
    ['an unknown dependency', withQuestion({ mark_points: [{ label: 'a', marks: 1.5, depends_on: 'b' }] }), 'questions[0].mark_points[0].depends_on', 'no mark point'],
    ['a point that depends on itself', withQuestion({ mark_points: [{ label: 'a', marks: 1.5, depends_on: 1 }] }), 'questions[0].mark_points[0].depends_on', 'circle'],
    ['a name box off the page', { ...everyday, name_region: { page: 1, x: 500, y: 10, w: 300, h: 20 } }, 'name_region', 'edge'],
    ['a missing key', { ...everyday, title: undefined }, 'title', 'missing'],
    ['a wrong kind of value', withQuestion({ region: { x: '1', y: 1, w: 1, h: 1 } }), 'questions[0].region.x', 'number'],
    ['a newer format', { ...everyday, format: 2 }, 'format', 'newer'],
  ])('%s', (_what, file, at, says) => {
    expect(faults(file)).toEqual(expect.arrayContaining([{ path: at, says: expect.stringContaining(says) }]))
  })

  it('names every fault, not only the first', () => {
    expect(faults(withQuestion({ label: '2', max_marks: 3 })).length).toBeGreaterThanOrEqual(2)
  })

  it('compares pages with the PDF', () => {
    const a4 = { width: 595.28, height: 841.89 }
    expect(faults(everyday, [{ page: 1, ...a4 }])).toEqual([{ path: 'pages', says: 'is 2, and the PDF has 1' }])
    expect(faults(everyday, [{ page: 1, ...a4 }, { page: 2, width: 612, height: 792 }])[0]!.says).toContain('page 2')
    expect(faults(everyday, [{ page: 1, width: 595, height: 842 }, { page: 2, ...a4 }])).toEqual([])
  })

  it('ignores keys it does not know', () => {
    expect(faults({ ...everyday, colour: 'blue' })).toEqual([])
  })

  it('says what a file is that is no object', () => {
    expect(faults('hello')).toEqual([{ path: 'the file', says: 'should be an object with keys' }])
  })
})
