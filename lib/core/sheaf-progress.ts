import type { ErrorCode, ErrorDetail } from './errors'

/** How one leaf looks on the scan page. Before its sheaf is placed: what it shows by itself. */
export type LeafLook = 'clear' | 'unclear' | 'placed' | 'loose' | 'blank' | 'set_aside' | 'unreadable'
export type LeafLine = Readonly<{ number: number; look: LeafLook; turned: boolean }>

/** How many sheets of a sheaf are read: where one picture shows two pages, both lines bear its number. */
export function sheetsRead(leaves: readonly Pick<LeafLine, 'number'>[]): number {
  return new Set(leaves.map(({ number }) => number)).size
}

/** A sheaf on its way: `leaves` are those read so far, by the number a person counts from 1. */
export type SheafProgress = Readonly<{
  id: string
  name: string
  state: 'waiting' | 'reading' | 'placed' | 'failed'
  leafCount: number
  leaves: readonly LeafLine[]
  scripts: number
  secondsLeft: number | null
  problem: ErrorCode | 'failed' | null
  problemDetail: ErrorDetail
  receivedAt: number
}>

export type SittingClassChoice = Readonly<{ classSetId: string; className: string; satOn: string; students: number }>

/** What the scan page shows: whose scripts a sheaf can hold, what the paper still lacks, and every sheaf. */
export type ScanPageData = Readonly<{
  hasBlankPaper: boolean
  questions: number
  limitMb: number
  classSets: readonly SittingClassChoice[]
  sheaves: readonly SheafProgress[]
  /** Whether the demo school has a scanned pile of this paper to try with; false as soon as there is a sheaf. */
  demoPile: boolean
}>

const lately = 24

/** Seconds until the rest is read, by the pace of the last leaves; null while there is no pace yet. Times in ms. */
export function secondsLeft(readAt: readonly number[], leafCount: number): number | null {
  const recent = [...readAt].sort((a, b) => a - b).slice(-lately)
  const rest = leafCount - readAt.length
  if (recent.length < 4 || rest <= 0) return null
  return Math.max(1, Math.round((((recent.at(-1)! - recent[0]!) / (recent.length - 1)) * rest) / 1000))
}
