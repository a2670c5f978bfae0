import type { PaperCounts } from './paper-stages'

/** A question with how many of its answers have a settled mark and how many wait for one. */
export type QuestionLeft = Readonly<{ id: string; label: string; left: number; marked: number }>

/** One line of the home page: a paper in one class, as it stands for one person. */
export type PaperLine = Readonly<{
  paperId: string
  title: string
  /** Null: no class sits the paper yet. */
  classSetId: string | null
  className: string | null
  satOn: string | null
  students: number
  part: 'owner' | 'marker' | 'moderator'
  hasBlank: boolean
  counts: PaperCounts
  /** Only what this person marks, in the order of the paper. */
  questions: readonly QuestionLeft[]
  /** Leaves read of all while a sheaf is being read. */
  reading: Readonly<{ done: number; of: number | null }> | null
  /** Where this person is the moderator: scripts of their own sample read, and all. */
  sample: Readonly<{ read: number; of: number }> | null
  /** When it was last handed back, in milliseconds. */
  handedBackAt: number | null
}>
