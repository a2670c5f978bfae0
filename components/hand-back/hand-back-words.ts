import { counted } from '@/components/paper/stage-words'
import type { CheckKey, HandBackStudent, KeptBackReason } from '@/lib/core/hand-back'

/** A check in the words of its list: what is found, and what it says when nothing is. */
export const checkWords: Record<CheckKey, Readonly<{ found: (n: number) => string; clear: string; step: string }>> = {
  names: { found: (n) => counted(n, 'name not confirmed', 'names not confirmed'), clear: 'every name confirmed', step: 'Confirm the name' },
  unsettled: { found: (n) => counted(n, 'script with marks missing', 'scripts with marks missing'), clear: 'every answer has its mark', step: 'Mark' },
  loose: { found: (n) => counted(n, 'loose sheet', 'loose sheets'), clear: 'no sheet lies loose', step: 'Sort it' },
  'no-script': { found: (n) => counted(n, 'student without a script', 'students without a script'), clear: 'a script for everyone who sat it', step: 'Find it, or mark absent' },
  doubled: { found: (n) => counted(n, 'script for a student who has one', 'scripts for students who have one'), clear: 'no student has two scripts', step: 'Look at both names' },
  missing: { found: (n) => counted(n, 'script with a page missing', 'scripts with pages missing'), clear: 'no page missing', step: 'Look for the page' },
  over: { found: (n) => counted(n, 'mark that cannot be', 'marks that cannot be'), clear: 'every mark within its maximum and on the step', step: 'Look at the mark' },
  method: { found: (n) => counted(n, 'answer mark without its method mark', 'answer marks without their method marks'), clear: 'answer marks stand on their method marks', step: 'Look at the mark' },
  flags: { found: (n) => counted(n, 'open flag', 'open flags'), clear: 'no open flag', step: 'Answer it' },
  sample: { found: (n) => counted(n, 'sampled script without a decision', 'sampled scripts without a decision'), clear: 'no sampled script undecided', step: 'Second-mark' },
}

export const keptBackWords: Record<KeptBackReason, string> = {
  absent: 'absent', no_script: 'no script', no_page: 'no page scanned', kept_back: 'kept back', name_open: 'name not confirmed', unmarked: 'marks missing',
  page_shared: 'one picture shows two pages: scan that sheet again', page_unreadable: 'a page cannot be read: scan that sheet again', sheaf_missing: 'the scan is gone',
}

/** A student's state in the list. */
export function stateWords({ returned, changed, keptBack }: HandBackStudent): string {
  if (keptBack) return returned ? `handed back, now ${keptBackWords[keptBack]}` : keptBackWords[keptBack]
  if (!returned) return 'not handed back yet'
  return changed ? 'changed since it was handed back' : 'handed back'
}

/** "Hand back 29 scripts" */
export function actWords(scripts: number): string {
  return `Hand back ${counted(scripts, 'script', 'scripts')}`
}
