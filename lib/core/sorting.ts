import type { LeafProblem, LeafReason } from './leaf'
import type { Turn } from './paper-space'

/** Where a leaf may be put: in a script, or in a new one of a student who has none. */
export type PlaceTarget = Readonly<{ scriptId: string } | { classSetId: string; studentId: string }>

/** Why a place is likely. `apart` counts leaves between the loose sheet and the nearest leaf of that script; 0 for one of another sheaf. */
export type PlaceReason = 'follows' | 'precedes' | 'second_scan' | 'no_script' | 'lacks_page' | 'looks_same'
export type LikelyPlace = Readonly<{ target: PlaceTarget; reason: PlaceReason; apart: number }>

/** From this certainty on a suggested name may be confirmed with others at a glance; only a number that is plainly read gets there. */
export const certainName = 0.99

export type SortStudent = Readonly<{
  classSetId: string
  className: string
  studentId: string
  candidateNumber: string
  givenName: string
  familyName: string
  attendance: 'expected' | 'absent' | 'excused'
  /** The script that bears this name. */
  scriptId: string | null
  /** Another student of these lists has the same name: read the number. */
  sameName: boolean
}>

/** A page of a script with the leaf that holds now, how far that leaf is turned to read upright, what the engine says of it, and how many older scans of the page are kept. */
export type SortScriptPage = Readonly<{ id: string; paperPage: number | null; leafId: string | null; turn: Turn; reasons: readonly LeafReason[]; older: number }>
/** A script on the sorting table. `student` is the confirmed name, `suggested` only a guess with its reason. */
export type SortScript = Readonly<{
  id: string
  number: number
  classSetId: string
  studentId: string | null
  suggestedStudentId: string | null
  /** Why that student: `number` (the digits in the boxes) or `list_order`. */
  suggestionReason: string | null
  /** How sure the suggestion is, 0 to 1; from `certainName` on it may be confirmed at a glance. */
  suggestionCertainty: number | null
  /** The candidate number as it was read, a dot for each digit that is not sure; null when nothing was read. */
  numberRead: string | null
  pages: readonly SortScriptPage[]
  missing: readonly number[]
}>

/** A leaf by the number a person counts from 1, in its sheaf. `half` tells the left (0) from the right page where one image shows two. */
export type LeafStub = Readonly<{ id: string; number: number; half: 0 | 1 | null; sheafName: string; turn: Turn }>
export type LeafNeighbour = Readonly<{ number: number; half: 0 | 1 | null; state: 'placed' | 'loose' | 'blank' | 'set_aside' | 'read'; paperPage: number | null; scriptId: string | null }>

export type LooseLeaf = LeafStub & Readonly<{
  /** Pixels of the leaf as stored: of its own part where an image shows two pages. */
  width: number | null
  height: number | null
  /** The page its print says it is; null when the print does not say. */
  paperPage: number | null
  guesses: readonly Readonly<{ paperPage: number; confidence: number }>[]
  reasons: readonly LeafReason[]
  /** Pages that the script lacks which it would lie in. */
  missing: readonly number[]
  problem: LeafProblem | null
  before: LeafNeighbour | null
  after: LeafNeighbour | null
  places: readonly LikelyPlace[]
}>

/** Everything the sorting table shows. */
export type SortingTable = Readonly<{
  paperId: string
  title: string
  classes: readonly string[]
  pages: readonly Readonly<{ page: number; width: number; height: number }>[]
  /** The page with the name box, and which boxes it has; null when the paper has none. */
  namePage: number | null
  nameBoxes: readonly ('name' | 'number')[]
  students: readonly SortStudent[]
  scripts: readonly SortScript[]
  loose: readonly LooseLeaf[]
  setAside: readonly LeafStub[]
  blank: readonly LeafStub[]
  /** Sheaves still being read: more will come. */
  reading: number
  lastAct: string | null
}>
