import { readFileSync } from 'node:fs'
import path from 'node:path'

export type ClassSetName = 'everyday' | 'one-page' | 'bitonal' | 'booklet'

type Rect = Readonly<{ x: number; y: number; w: number; h: number }>
/** What a class set's truth.json says of a page image; index counts from 0. */
export type TruthPage = Readonly<{ index: number; kind: 'script' | 'blank' | 'foreign' | 'duplicate'; candidate_number: string | null; paper_page: number | null }>
/** What a student wrote to a question; marks as decimals. */
export type TruthResponse = Readonly<{ candidate_number: string; question: string; blank: boolean; intended_marks: number; scanned: boolean }>
export type TruthQuestion = Readonly<{ label: string; region: Rect; areas?: Readonly<{ answer?: Rect; working?: Rect }> }>

/** The path of a file of one of the invented class sets. */
export function classSetPath(name: ClassSetName, file: 'paper.pdf' | 'paper.json' | 'roster.csv' | 'scan.pdf' | 'truth.json'): string {
  return path.join(import.meta.dirname, 'class-sets', name, file)
}

export function readClassSetFile(name: ClassSetName, file: Parameters<typeof classSetPath>[1]): Buffer {
  return readFileSync(classSetPath(name, file))
}

/** What is really on each page, and what each answer deserves: nothing of the product reads this, only seeds and tests. */
export function readTruth(name: ClassSetName): Readonly<{ pages: readonly TruthPage[]; responses: readonly TruthResponse[]; questions: readonly TruthQuestion[] }> {
  return JSON.parse(readClassSetFile(name, 'truth.json').toString('utf8'))
}
