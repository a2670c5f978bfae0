import type { LeafNeighbour, LikelyPlace, LooseLeaf, SortScript, SortStudent, SortingTable } from '@/lib/core/sorting'
import { sayLeaf } from './say-leaf'

export function fullName({ givenName, familyName }: Pick<SortStudent, 'givenName' | 'familyName'>): string {
  return `${givenName} ${familyName}`
}

/** Whose a script is: the name it bears, the one suggested, or only its number. */
export function whose(script: SortScript | undefined, table: Pick<SortingTable, 'students'>): { name: string; number: string | null; sure: boolean } {
  if (!script) return { name: 'a script', number: null, sure: false }
  const id = script.studentId ?? script.suggestedStudentId
  const student = table.students.find((one) => one.studentId === id && one.classSetId === script.classSetId)
  if (!student) return { name: `Script ${script.number}`, number: null, sure: false }
  return { name: fullName(student), number: student.candidateNumber, sure: script.studentId !== null }
}

/** The student suggested for a script. */
export function suggestedFor(script: SortScript, table: Pick<SortingTable, 'students'>): SortStudent | undefined {
  return table.students.find(({ studentId, classSetId }) => studentId === script.suggestedStudentId && classSetId === script.classSetId)
}

/** Why a student is suggested. */
export function whySuggested({ suggestionReason, numberRead }: Pick<SortScript, 'suggestionReason' | 'numberRead'>, student: Pick<SortStudent, 'sameName'>): string {
  const read = numberRead ? `number read as ${numberRead}` : 'no number read'
  if (student.sameName) return `a namesake is on the list; ${read}`
  return suggestionReason === 'number' ? read : `next on the list; ${read}`
}

function leavesAway(apart: number): string {
  const words = ['', 'directly', 'two leaves', 'three leaves', 'four leaves', 'five leaves', 'six leaves']
  return words[apart] ?? `${apart} leaves`
}

/** Why a place is offered. `page` is the page that would be put there. */
export function whyThere(place: LikelyPlace, page: number | null, script: SortScript | undefined, student: SortStudent | undefined): string {
  if (place.reason === 'no_script') return student && student.attendance !== 'expected' ? `has no script; marked ${student.attendance}` : 'has no script yet'
  if (place.reason === 'lacks_page') return `page ${page ?? ''} missing`
  if (place.reason === 'looks_same') return `its page ${page ?? ''} looks the same: this scan would take its place, marks stay`
  if (place.reason === 'second_scan') return `has a page ${page} already, ${leavesAway(place.apart)} ${place.apart === 1 ? 'beside it' : 'away'}`
  const lies = `lies ${leavesAway(place.apart)} ${place.reason === 'follows' ? 'before it' : 'after it'}`
  return page !== null && script?.missing.includes(page) ? `${lies}; page ${page} missing` : lies
}

/** What a neighbour in the pile is. */
export function sayNeighbour(leaf: LeafNeighbour | null, table: SortingTable): string {
  if (!leaf) return 'nothing: the sheaf ends here'
  const at = sayLeaf(leaf)
  if (leaf.state === 'blank') return `${at}, an empty back`
  if (leaf.state === 'set_aside') return `${at}, set aside`
  if (leaf.state !== 'placed') return `${at}, loose too`
  const { name, sure } = whose(table.scripts.find(({ id }) => id === leaf.scriptId), table)
  return `${at}, ${leaf.paperPage === null ? 'extra page' : `page ${leaf.paperPage}`} of ${sure || name.startsWith('Script') ? name.replace(/^Script/, 'script') : `perhaps ${name}`}`
}

/** How sure the page of a loose sheet is. */
export function howSure(leaf: Pick<LooseLeaf, 'paperPage' | 'guesses'>, page: number | null): string {
  if (page === null) return 'not known: choose it'
  if (leaf.paperPage === page) return 'sure: its printed lines fit'
  return leaf.guesses[0]?.paperPage === page ? 'perhaps: its printed lines fit only in part' : 'by your word'
}

/** "3 loose sheets, 4 names", or that all is done. */
export function leftToSort({ loose, scripts }: Pick<SortingTable, 'loose' | 'scripts'>): string {
  const names = scripts.filter(({ studentId }) => studentId === null).length
  const parts = [loose.length > 0 && `${loose.length} loose ${loose.length === 1 ? 'sheet' : 'sheets'}`, names > 0 && `${names} ${names === 1 ? 'name' : 'names'}`].filter(Boolean)
  return parts.length > 0 ? parts.join(', ') : 'all sorted'
}

const actWords: Record<string, string> = {
  'leaf.placed': 'placing', 'leaf.extra': 'extra page', 'leaf.loosened': 'taking out', 'leaf.set-aside': 'setting aside', 'leaf.turned': 'turn', 'script.named': 'name', 'script.certain-named': 'certain names', 'script.unnamed': 'taking a name away',
  'student.attendance': 'attendance',
}
/** What Z takes back. */
export function sayAct(act: string | null): string {
  return act ? `undo ${actWords[act] ?? 'the last'}` : 'nothing to undo'
}
