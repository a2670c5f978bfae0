import { sum, type HalfMarks } from '@/lib/core/marks'
import type { ComparedTotal, FigureRow, HeatCell, ModerationFigures } from '@/lib/core/moderation-figures'
import { agreementOf } from './agreement'
import { markFigures, type Compared } from './mark-figures'

/** A question of a sample with the tolerance it is held to, in halves. */
export type Column = Readonly<{ id: string; label: string; maximum: HalfMarks; tolerance: HalfMarks }>
/** An answer with a settled first and a settled blind second mark, in halves, and who gave the first. */
export type BothMarked = Readonly<{ scriptId: string; questionId: string; markerId: string; marker: string; first: HalfMarks; second: HalfMarks }>

type Asked = Readonly<{ answers: readonly BothMarked[]; columns: readonly Column[]; numbers: ReadonlyMap<string, number> }>

/** The one value that all have; null when they differ or there is none. */
function same<T>(values: readonly T[]): T | null {
  return values.length > 0 && values.every((value) => value === values[0]) ? values[0]! : null
}

function grouped<T>(items: readonly T[], keyOf: (item: T) => string): Map<string, T[]> {
  const groups = new Map<string, T[]>()
  for (const item of items) {
    const group = groups.get(keyOf(item))
    if (group) group.push(item)
    else groups.set(keyOf(item), [item])
  }
  return groups
}

/** Scripts second-marked in every question, by running number. */
function wholeScripts({ answers, columns, numbers }: Asked): ComparedTotal[] {
  return [...grouped(answers, ({ scriptId }) => scriptId)].filter(([, own]) => own.length === columns.length)
    .map(([scriptId, own]) => ({ scriptId, scriptNumber: numbers.get(scriptId) ?? 0, first: sum(own.map(({ first }) => first)), second: sum(own.map(({ second }) => second)) }))
    .sort((a, b) => a.scriptNumber - b.scriptNumber)
}

/**
 * What both marks of a sample show, by question, by first marker, over all answers and over the totals of whole scripts, and each marker
 * in each question. `columns` are the questions of the sample; answers come in any order. Questions nobody second-marked yet have rows with n = 0.
 */
export function figuresBy(asked: Asked): ModerationFigures {
  const { answers, columns } = asked
  const columnOf = new Map(columns.map((column) => [column.id, column]))
  const known = answers.filter(({ questionId }) => columnOf.has(questionId))
  const pair = ({ first, second, questionId }: BothMarked) => ({ first, second, tolerance: columnOf.get(questionId)!.tolerance })
  const row = (key: string, label: string, own: readonly BothMarked[]): FigureRow => {
    const [maximum, tolerance] = [same(own.map(({ questionId }) => columnOf.get(questionId)!.maximum)), same(own.map(({ questionId }) => columnOf.get(questionId)!.tolerance))]
    return { key, label, maximum, tolerance, figures: markFigures(own.map(pair), maximum !== null) }
  }
  const markers = [...grouped(known, ({ markerId }) => markerId)].map(([id, own]) => ({ id, name: own[0]!.marker, own })).sort((a, b) => (a.name === b.name ? (a.id < b.id ? -1 : 1) : a.name < b.name ? -1 : 1))
  const comparedTotals = wholeScripts({ ...asked, answers: known })
  return {
    questions: columns.map((column) => ({ ...row(column.id, column.label, known.filter(({ questionId }) => questionId === column.id)), maximum: column.maximum, tolerance: column.tolerance })),
    markers: markers.map(({ id, name, own }) => row(id, name, own)),
    answers: row('answers', 'All answers', known),
    totals: {
      key: 'totals', label: 'Script totals', maximum: sum(columns.map(({ maximum }) => maximum)), tolerance: null,
      figures: markFigures(comparedTotals.map(({ first, second }): Compared => ({ first, second, tolerance: null })), true),
    },
    comparedTotals,
    heat: markers.flatMap(({ id, own }) => columns.map((column): HeatCell => {
      const { n, exact, within, meanDifference, few } = agreementOf(own.filter(({ questionId }) => questionId === column.id).map(pair))
      return { markerId: id, questionId: column.id, n, exact, within, mean: meanDifference, few }
    })),
  }
}
