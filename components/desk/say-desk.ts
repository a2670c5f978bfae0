import { errorSentence } from '@/components/ui/error-sentence'
import { markOf, responseState } from '@/lib/core/marking'
import { sayMark } from '@/lib/core/marks'
import { sayStamp } from '@/lib/core/say-stamp'
import type { Stamp } from '@/lib/core/stamp'
import type { Strip } from '@/lib/core/run'
import { stampsOf, type DeskState, type Says } from './desk-state'
import type { Saving } from './stamp-queue'

const words = {
  'opened-again': 'Opened again. Enter settles it.',
  'run-finished': 'Every answer of this run is marked.',
  'nothing-to-undo': 'Nothing to undo since the desk was opened.',
  'nothing-to-redo': 'Nothing to do again.',
}

export function saySays(says: Says): string {
  return 'words' in says ? words[says.words] : errorSentence(says.code, says.detail)
}

/** How a strip stands, short, as in its right margin. */
export function sayStanding(strip: Strip): string {
  if (strip.bar === 'begun-by-other' && !strip.marking) return 'another marker'
  const state = responseState(strip.marking)
  if (state === 'unmarked') return 'not marked'
  return state === 'nothing-written' ? 'nothing written' : state === 'open' ? 'not settled' : ''
}

/** The strip in hand for those who hear the screen: its place, its mark, how it stands. */
export function sayHand({ strips, hand, run }: DeskState): string {
  const strip = strips[hand]
  if (!strip) return 'No strips.'
  const stamps = strip.marking?.stamps ?? []
  const mark = responseState(strip.marking) === 'unmarked' ? '' : `, ${sayMark(markOf(stamps))} of ${sayMark(run.question.maximum)}`
  const standing = sayStanding(strip)
  return `Script ${strip.number} of ${strips.length}${mark}${standing ? `, ${standing}` : ', settled'}${strip.rescanned ? ', scanned again since' : ''}`
}

/** A stamp in words with the point it is for. */
export function sayStampOf(stamp: Stamp, { question }: DeskState['run']): string {
  const point = question.points.find((candidate) => candidate.id === stamp.markPointId)
  return point ? `${sayStamp(stamp)}, for ${point.label}` : sayStamp(stamp)
}

/** All stamps of a strip in one sentence list. */
export function sayStamps(strip: Strip, run: DeskState['run']): string {
  return stampsOf(strip).map((stamp) => `${sayStampOf(stamp, run)}.`).join(' ') || 'No stamps.'
}

export function saySaving({ waiting, trouble, savedAt }: Saving): string {
  const kept = `${waiting} ${waiting === 1 ? 'stamp' : 'stamps'} kept here`
  if (trouble === 'no-network' && waiting > 0) return `No network. ${kept}`
  if (trouble === 'signed-out' && waiting > 0) return `Signed out. ${kept}`
  if (waiting > 0) return 'Saving'
  return savedAt === null ? 'Saved as you go' : `Saved ${new Date(savedAt).toLocaleTimeString('en-GB')}`
}
