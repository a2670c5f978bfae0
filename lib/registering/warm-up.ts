import type { GreyPicture } from '@/lib/core/grey-picture'
import type { Cv } from './opencv'
import { registerLeaf } from './register-leaf'
import type { Template } from './template'

/** So many leaves see the whole path compiled. */
const leaves = 8

/** Registers blank pages to themselves, so that the first leaves of a sheaf are read as quickly as the later ones. */
export function warmUp(cv: Cv, paper: readonly Template[]): void {
  for (let k = 0; k < leaves; k++) {
    const { picture } = paper[k % paper.length]!.page
    const { width, height, data } = twice(picture)
    registerLeaf(cv, { encoding: 'rendered', width, height, dpiX: 200, dpiY: 200, shownTurn: 0 }, { width, height, data }, paper)
  }
}

/** Every pixel four times: 200 dots an inch, as most scans have. */
function twice({ width, height, data }: GreyPicture): GreyPicture {
  const out = new Uint8Array(4 * width * height)
  for (let y = 0, to = 0; y < 2 * height; y++) for (let x = 0, from = (y >> 1) * width; x < 2 * width; x++, to++) out[to] = data[from + (x >> 1)]!
  return { width: 2 * width, height: 2 * height, data: out }
}
