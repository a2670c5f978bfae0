import type { HalfMarks } from './marks'

/** The clerical check before a release, in the order it is read. */
export const checkKeys = ['names', 'unsettled', 'loose', 'no-script', 'doubled', 'missing', 'over', 'method', 'flags', 'sample'] as const
export type CheckKey = (typeof checkKeys)[number]

/**
 * How a line can be closed besides mending it: `sign` by name with a reason; `keep-back` leaves that script out of the release, by
 * name with a reason, for what nobody may sign away.
 */
export type Closing = 'sign' | 'keep-back'

export type SignOff = Readonly<{ by: string; at: number; reason: string }>
/** One thing found. `subject` tells it from the next; `scriptId` is the script it is about. */
export type CheckLine = Readonly<{ subject: string; says: string; scriptId: string | null; href: string; signed: SignOff | null }>
export type Check = Readonly<{ key: CheckKey; closing: Closing; lines: readonly CheckLine[] }>

/** Lines still open: none may be when scripts are handed back. */
export function openLines(checks: readonly Check[]): CheckLine[] {
  return checks.flatMap(({ lines }) => lines.filter(({ signed }) => signed === null))
}

/** A code of what keeps a script from going: see `keptBackWords`. */
export type KeptBackReason = 'absent' | 'no_script' | 'no_page' | 'kept_back' | 'name_open' | 'unmarked' | 'page_shared' | 'page_unreadable' | 'sheaf_missing'

export type HandBackStudent = Readonly<{
  key: string
  name: string
  candidateNumber: string
  scriptNumber: number | null
  total: HalfMarks | null
  grade: string | null
  /** What was handed back and holds now. */
  returned: Readonly<{ id: string; revision: number; at: number; firstReadAt: number | null }> | null
  /** True: marks or pages differ from what was handed back. */
  changed: boolean
  keptBack: KeptBackReason | null
}>

export type ReleaseLine = Readonly<{ id: string; state: 'building' | 'released' | 'withdrawn' | 'failed'; by: string; createdAt: number; releasedAt: number | null; dueAt: number | null; withdrawnAt: number | null; withdrawnBy: string | null; scripts: number; built: number; revision: number; problem: string | null }>

/** The hand-back page of one class set. */
export type HandBackView = Readonly<{
  paperId: string
  classSets: readonly Readonly<{ id: string; className: string; satOn: string }>[]
  classSetId: string | null
  maximum: HalfMarks
  solutionsReleased: boolean
  /** Empty while a release is being built. */
  checks: readonly Check[]
  students: readonly HandBackStudent[]
  /** How many scripts would go now: new ones and changed ones; `mails` of them to an address. */
  ready: Readonly<{ scripts: number; changed: number; mails: number }>
  building: ReleaseLine | null
  releases: readonly ReleaseLine[]
}>
