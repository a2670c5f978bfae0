import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import type { Homography } from '@/lib/core/paper-space'
import { drawStamp } from '@/lib/core/drawing'
import { halves } from '@/lib/core/marks'
import { Stamp } from '@/lib/core/stamp'
import type { ScriptPage } from '@/lib/handing-back/returned-page'
import type { PointResult } from '@/lib/core/returned'
import type { QuestionResult, Summary } from '@/lib/handing-back/summary'

export const everyday = join(process.cwd(), 'seeds/class-sets/everyday')

type TruthPage = Readonly<{ index: number; kind: string; candidate_number: string; paper_page: number; rotation: number; homography: Homography; width_px: number; height_px: number }>

/** The pages of the everyday set as they really lie. */
export function truthPages(): TruthPage[] {
  return (JSON.parse(readFileSync(join(everyday, 'truth.json'), 'utf8')) as { pages: TruthPage[] }).pages.filter((page) => page.kind === 'script')
}

export function aStampAt(x: number, y: number, more: Partial<Record<keyof Stamp, unknown>> = {}): Stamp {
  return Stamp.parse({ id: '6f9619ff-8b86-4d01-b42d-00cf4fc964ff', markingId: 'm', version: 1, kind: 'tick', worth: 2, markPointId: null, scriptPageId: null, x, y, ...more })
}

export function aScriptPage(page: TruthPage, more: Partial<ScriptPage> = {}): ScriptPage {
  return {
    sheaf: 'everyday',
    index: page.index,
    homography: page.homography,
    image: { width: page.width_px, height: page.height_px },
    drawings: [{ pen: 'first', inks: drawStamp(aStampAt(300, 200)) }],
    words: `Page ${page.paper_page}, a picture of handwriting. Marking: Tick, one mark.`,
    ...more,
  }
}

const point = (says: string, earned: number, worth: number): PointResult => ({ says, earned: halves(earned), worth: halves(worth) })

export function aQuestion(label: string, points: readonly PointResult[], maximum: number, comments: readonly string[] = [], remark: string | null = null): QuestionResult {
  const mark = points.reduce((sum, { earned }) => sum + earned, 0)
  return { label, points, remark, comments, mark: halves(mark), maximum: halves(maximum) }
}

/** A made-up student's results on the everyday paper. */
export function aSummary(more: Partial<Summary> = {}): Summary {
  return {
    title: 'Percentages, ratio and area',
    where: 'Kestrel Bay School, class 8K, spring test',
    student: 'Ibrahim Souza',
    candidateNumber: '8144',
    about: 'handed back 18 March, marked by R. Adeyemi, sample second-marked',
    total: halves(21),
    ticks: halves(21),
    adjustments: [],
    maximum: halves(40),
    percent: 53,
    grade: '5',
    gradeSays: 'Grade 5 begins at 10½ under the school’s scale for this test. A person has seen this result.',
    pen: 'first',
    questions: [
      aQuestion('1a', [point('Finds 10% or 5%', 1, 1), point('36', 2, 2)], 3),
      aQuestion('1b', [point('Finds 35% of 80', 0, 2), point('Subtracts: 52', 1, 2)], 4, ['35% of 80 is 28, not 26']),
      aQuestion('2', [point('Correct answer', 2, 2)], 2),
      aQuestion('3a', [point('Multiplies by 3', 1, 1), point('15', 2, 2)], 3),
      aQuestion('3b', [point('Seven parts', 2, 2), point('10', 0, 2)], 4, ['5 is one part; red is 2 parts']),
      aQuestion('4', [point('Correct answer', 0, 1)], 1, ['divide both by 6']),
      aQuestion('5a', [], 6, [], 'nothing written'),
      aQuestion('5b', [point('Multiplies the area by 9', 0, 1), point('792', 0, 2)], 3, ['multiply the area by 9']),
      aQuestion('6', [point('Uses half base times height', 2, 2), point('Rearranges', 1, 1), point('9', 2, 2)], 5),
      aQuestion('7', [point('Says no', 0, 2), point('Takes 10% of the larger amount', 0, 2)], 4, ['10% of which price?']),
      aQuestion('8', [point('Nine parts', 1, 1), point('One part is £8', 2, 2), point('16', 2, 2)], 5),
    ],
    next: ['Do 1b again from 10% of 80.', 'In 3b, multiply one part by the 2 of red.', 'Try 5a: split the floor into two rectangles.'],
    solutions: [],
    codes: [{ code: 'ft', means: 'follow through: right working on an earlier slip' }],
    asking: 'You can ask about a mark until 1 April. A review can raise or lower it.',
    ...more,
  }
}
