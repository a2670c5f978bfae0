import { sheetsRead, type LeafLine, type SheafProgress } from '@/lib/core/sheaf-progress'

/** 1 leaf, 2 leaves. */
export function counted(n: number, one: string, many = `${one}s`): string {
  return `${n} ${n === 1 ? one : many}`
}

/** "leaf 18", "leaves 7 and 8", "leaves 3, 5, 9 and 4 more". */
export function namedLeaves(numbers: readonly number[]): string {
  const shown = numbers.slice(0, 5)
  const more = numbers.length - shown.length
  const parts = more > 0 ? [...shown, `${more} more`] : shown
  const list = parts.length > 1 ? `${parts.slice(0, -1).join(', ')} and ${parts.at(-1)}` : `${parts[0]}`
  return `${numbers.length === 1 ? 'leaf' : 'leaves'} ${list}`
}

/** "a few seconds left", "about half a minute left", "about 3 minutes left": round enough that it does not flicker from look to look. */
export function timeLeft(seconds: number): string {
  if (seconds < 10) return 'a few seconds left'
  if (seconds < 45) return 'about half a minute left'
  const minutes = Math.round(seconds / 60)
  if (minutes < 2) return 'about a minute left'
  return minutes < 90 ? `about ${minutes} minutes left` : `about ${Math.round(minutes / 60)} hours left`
}

/** Which leaf is being read, for whoever listens: said anew only at every tenth part of the sheaf. */
export function saidProgress({ state, leaves, leafCount, secondsLeft }: Pick<SheafProgress, 'state' | 'leaves' | 'leafCount' | 'secondsLeft'>): string {
  if (state === 'waiting') return 'Waiting to be read'
  if (state !== 'reading') return ''
  const tenths = Math.floor((10 * sheetsRead(leaves)) / Math.max(1, leafCount))
  if (tenths >= 10) return 'All leaves read'
  return tenths === 0 ? 'Reading has begun' : `${tenths * 10} per cent read${secondsLeft === null ? '' : `, ${timeLeft(secondsLeft)}`}`
}

export type TallyLine = Readonly<{ what: string; count: number; says: string }>

/** What was found, in words. While a sheaf is read it is only what each leaf shows by itself. */
export function tally({ state, leaves, leafCount, scripts }: Pick<SheafProgress, 'state' | 'leaves' | 'leafCount' | 'scripts'>): TallyLine[] {
  const of = (...looks: LeafLine['look'][]) => leaves.filter(({ look }) => looks.includes(look))
  const numbers = (lines: readonly LeafLine[]) => [...new Set(lines.map(({ number }) => number))]
  const turned = leaves.filter((leaf) => leaf.turned && leaf.look !== 'unreadable')
  const done = state === 'placed'
  const found = done ? of('placed') : of('clear', 'placed')
  const loose = of('loose', 'unclear', 'unreadable')
  const lines: TallyLine[] = [
    { what: done ? 'Placed in scripts' : 'Pages recognised', count: found.length, says: done ? `in ${counted(scripts, 'script')}` : scripts > 0 ? `${counted(scripts, 'script')} in place` : 'put into scripts as soon as they are certain' },
    { what: 'Turned the right way up', count: turned.length, says: turned.length > 0 ? namedLeaves(numbers(turned)) : '' },
    { what: 'Empty backs', count: of('blank').length, says: 'kept, not shown while marking' },
    { what: done ? 'Loose sheets' : 'Not sure yet', count: loose.length, says: loose.length > 0 ? `${namedLeaves(numbers(loose))}${done ? ', for the sorting table' : ''}` : '' },
    { what: 'Set aside', count: of('set_aside').length, says: 'kept, not part of this test' },
  ]
  if (state === 'failed') lines.push({ what: 'Not read', count: leafCount - sheetsRead(leaves), says: 'what is read is kept' })
  return lines.filter(({ count, what }) => count > 0 || what === 'Loose sheets' || what === 'Placed in scripts' || what === 'Pages recognised')
}
