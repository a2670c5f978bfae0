import { newId } from '@/lib/core/ids'
import { halves } from '@/lib/core/marks'
import type { PressedStamp } from '@/lib/core/stamp'

type Wanted = Omit<Partial<PressedStamp>, 'worth'> & Readonly<{ responseId: string; worth?: number }>

/** A tick worth one mark, as the desk sends it, in the first round; say what is different. */
export function aStamp({ worth = 2, ...wanted }: Wanted): PressedStamp {
  return {
    id: newId(), version: 1, kind: worth === 1 ? 'half' : 'tick', markPointId: null, scriptPageId: null, x: 300, y: 200, w: 0, h: 0, text: '', path: [], removed: false, round: 'first',
    ...wanted, worth: halves(worth),
  }
}
