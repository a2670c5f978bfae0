import type { PaperPage, Withdrawal } from './paper'
import type { Setting } from './setting'

/** A paper as the Set screen opens it. `stamped` are ids of questions and points that marking has touched. */
export type SettingView = Readonly<{
  paperId: string
  title: string
  /** The scheme's version: a save names the one it was made on. */
  version: number
  /** Changes with each new blank paper; null: there is none yet. */
  blank: string | null
  pages: readonly PaperPage[]
  setting: Setting
  stamped: readonly string[]
  withdrawnQuestions: Readonly<Record<string, Withdrawal>>
  withdrawnPoints: readonly string[]
  /** How many scripts have a scan of each page of the paper. */
  scanned: Readonly<Record<number, number>>
  /** A sample has been drawn: the tolerances stay as they are. */
  sampled: boolean
}>
