import type { ImagePart } from '@/lib/core/leaf'
import type { Paper } from '@/lib/core/paper'
import type { Homography } from '@/lib/core/paper-space'
import type { ScriptTotal } from '@/lib/core/result'
import type { Round, Stamp } from '@/lib/core/stamp'

/** A page of the script as it lies in a sheaf. Sizes in pixels of the stored image, or of the page's own `part` of one that shows two pages. */
export type GatheredPage = Readonly<{
  id: string
  paperPage: number | null
  leaf: Readonly<{ sheafId: string; position: number; half: 0 | 1 | null; part?: ImagePart | null; width: number; height: number; homography: Homography | null }>
}>

/** How one question of a script stands: its settled marking that counts, or none. */
export type GatheredAnswer = Readonly<{
  questionId: string
  hasPage: boolean
  marking: Readonly<{ round: Round; marker: string; stamps: readonly Stamp[] }> | null
  adjustments: readonly Readonly<{ halves: number; reason: string }>[]
}>

/** Everything of one script that a returned script is made of, as plain values. */
export type GatheredScript = Readonly<{
  paper: Paper
  school: string
  className: string
  satOn: string
  givenName: string
  familyName: string
  candidateNumber: string
  pages: readonly GatheredPage[]
  answers: readonly GatheredAnswer[]
  total: ScriptTotal
  grade: string | null
  sampled: boolean
}>
