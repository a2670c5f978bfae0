import type { ErrorLine } from '@/lib/core/errors'

/** One thing wrong with a setting, where it is, and what to say about it. Indexes count from 0. */
export type SettingFault = Readonly<{ says: string; question?: number; label?: string; point?: number; space?: number; box?: number; key?: 'label' | 'maximum' | 'worth' | 'depends_on' | 'points' }>

/** The place as a path into a paper.json. */
export function pathInFile(fault: SettingFault): string {
  if (fault.question === undefined) return fault.box === undefined ? 'candidate_number_boxes' : fault.box < 0 ? 'name_region' : `candidate_number_boxes[${fault.box}]`
  const question = `questions[${fault.question}]`
  if (fault.point !== undefined) return `${question}.mark_points[${fault.point}]${fault.key === 'worth' ? '.marks' : fault.key ? `.${fault.key}` : ''}`
  if (fault.space !== undefined) return fault.space === 0 ? `${question}.region` : `${question}.more_spaces[${fault.space - 1}]`
  if (fault.key === 'points') return `${question}.mark_points`
  return fault.key === 'maximum' ? `${question}.max_marks` : fault.key ? `${question}.${fault.key}` : question
}

/** The place as a teacher says it. */
export function placeInWords(fault: SettingFault): string {
  if (fault.question === undefined) return fault.box !== undefined && fault.box < 0 ? 'Name box' : 'Number boxes'
  const question = fault.label ? `Question ${fault.label}` : `Question number ${fault.question + 1}`
  return fault.point === undefined ? question : `${question}, point ${fault.point + 1}`
}

export function faultLines(faults: readonly SettingFault[], path: (fault: SettingFault) => string): ErrorLine[] {
  return faults.map((fault) => ({ path: path(fault), says: fault.says }))
}
