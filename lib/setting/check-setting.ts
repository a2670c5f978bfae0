import { onStep, sayMark, type MarkingStep } from '@/lib/core/marks'
import type { PaperPage } from '@/lib/core/paper'
import type { PaperRect } from '@/lib/core/paper-space'
import type { Setting, SettingPoint, SettingQuestion } from '@/lib/core/setting'
import type { SettingFault } from './setting-fault'

/** Spaces drawn by hand may touch the very edge: half a point over it is not off the page. */
const edge = 0.5

/** Everything wrong with a setting drawn on these pages; nothing wrong is an empty list. `withdrawn` are ids of withdrawn points. */
export function checkSetting(setting: Setting, pages: readonly PaperPage[], withdrawn: ReadonlySet<string> = new Set()): SettingFault[] {
  return [...checkBoxes(setting, pages), ...repeatedLabels(setting.questions), ...setting.questions.flatMap((question, k) => checkQuestion(question, k, setting.step, pages, withdrawn))]
}

function offPage(pages: readonly PaperPage[], page: number, { x, y, w, h }: PaperRect): string | null {
  const found = pages.find((each) => each.page === page)
  if (!found) return `lies on page ${page}, and the paper has ${pages.length === 1 ? '1 page' : `${pages.length} pages`}`
  const inside = x >= -edge && y >= -edge && x + w <= found.width + edge && y + h <= found.height + edge
  return inside ? null : `reaches over the edge of page ${page} (${Math.round(found.width)} × ${Math.round(found.height)} pt)`
}

function checkBoxes({ boxes }: Setting, pages: readonly PaperPage[]): SettingFault[] {
  const names = boxes.filter((box) => box.kind === 'name')
  const numbers = boxes.filter((box) => box.kind === 'number')
  const faults: SettingFault[] = names.length > 1 ? [{ box: -1, says: 'is there more than once' }] : []
  for (const [k, { page, rect }] of [...names, ...numbers].entries()) {
    const says = offPage(pages, page, rect)
    if (says) faults.push({ box: k < names.length ? -1 : k - names.length, says })
  }
  return faults
}

function repeatedLabels(questions: readonly SettingQuestion[]): SettingFault[] {
  const seen = new Map<string, number>()
  return questions.flatMap(({ label }, question) => {
    const key = label.trim().toLowerCase()
    if (key === '') return [{ question, key: 'label' as const, says: 'needs a label, such as 3b' }]
    if (seen.has(key)) return [{ question, label, key: 'label' as const, says: `the label ${label} is there more than once` }]
    seen.set(key, question)
    return []
  })
}

function checkQuestion({ label, maximum, spaces, points }: SettingQuestion, question: number, step: MarkingStep, pages: readonly PaperPage[], withdrawn: ReadonlySet<string>): SettingFault[] {
  const faults: SettingFault[] = []
  const add = (says: string, more: Partial<SettingFault> = {}) => faults.push({ question, label, says, ...more })
  if (spaces.length === 0) add('has no answer space')
  for (const [space, { page, rect }] of spaces.entries()) {
    const says = offPage(pages, page, rect)
    if (says) add(`an answer space ${says}`, { space })
  }
  if (!onStep(maximum, step)) add(`${sayMark(maximum)} is not in whole marks, and this paper is marked in whole marks`, { key: 'maximum' })
  for (const [point, { label: earns, worth }] of points.entries()) {
    if (earns.trim() === '') add('says nothing: write what earns it', { point, key: 'label' })
    if (!onStep(worth, step)) add(`${sayMark(worth)} is not in whole marks, and this paper is marked in whole marks`, { point, key: 'worth' })
  }
  faults.push(...checkSum(question, label, maximum, points, withdrawn), ...checkDependencies(question, label, points))
  return faults
}

/** Points add up to the most that can be given; a withdrawn point may be counted in or out. */
function checkSum(question: number, label: string, maximum: number, points: readonly SettingPoint[], withdrawn: ReadonlySet<string>): SettingFault[] {
  if (points.length === 0) return []
  const add = (list: readonly SettingPoint[]) => list.reduce((total, point) => total + point.worth, 0)
  const all = add(points)
  if (all === maximum || add(points.filter((point) => !withdrawn.has(point.id))) === maximum) return []
  return [{ question, label, key: 'points', says: `the mark points add up to ${sayMark(all as never)}, and the most that can be given is ${sayMark(maximum as never)}` }]
}

function checkDependencies(question: number, label: string, points: readonly SettingPoint[]): SettingFault[] {
  const byId = new Map(points.map((point) => [point.id, point]))
  return points.flatMap((point, k) => {
    if (point.dependsOn === null) return []
    const fault = (says: string): SettingFault[] => [{ question, label, point: k, key: 'depends_on', says }]
    if (!byId.has(point.dependsOn)) return fault('depends on a mark point that is not in this question')
    for (let at = byId.get(point.dependsOn), steps = 0; at && steps <= points.length; at = at.dependsOn ? byId.get(at.dependsOn) : undefined, steps++) {
      if (at.id === point.id) return fault('depends on itself in a circle')
    }
    return []
  })
}
