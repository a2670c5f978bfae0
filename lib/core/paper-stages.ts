export const stageNames = ['Set', 'Scan', 'Sort', 'Mark', 'Second-mark', 'Hand back'] as const
export type StageName = (typeof stageNames)[number]

/** What is done and left at each stage of a paper, as plain counts. `marks` is the paper's maximum in half marks. */
export type PaperCounts = Readonly<{
  questions: number
  marks: number
  sheaves: number
  sheavesReading: number
  sheavesFailed: number
  leaves: number
  looseSheets: number
  scripts: number
  namesOpen: number
  pagesMissing: number
  /** Answers that have a picture and no settled mark that counts. */
  answersLeft: number
  answersMarked: number
  sampled: number
  sampleRead: number
  returned: number
}>

/** What the top of every page of a paper shows, and which stages this person may open. */
export type PaperStages = Readonly<{
  paperId: string
  title: string
  classes: readonly string[]
  open: readonly StageName[]
  counts: PaperCounts
}>
