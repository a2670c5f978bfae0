import type { PaperRect } from '@/lib/core/paper-space'
import { codeModules, symbolCorners } from '@/lib/core/printed-code'
import { num } from '@/lib/typesetting/operators'
import { moduleRuns } from './module-runs'

/** A token's QR symbol within its square, as filled boxes. `pageHeight` turns the paper's y (down) into the page's (up). */
export function drawCode(token: string, rect: PaperRect, pageHeight: number): string {
  const [corner, across] = symbolCorners(rect)
  const side = (across.x - corner.x) / codeModules
  const boxes = moduleRuns(token).map(({ column, row, length }) => `${num(corner.x + column * side)} ${num(pageHeight - corner.y - (row + 1) * side)} ${num(length * side)} ${num(side)} re`)
  return `q 0 g ${boxes.join(' ')} f Q`
}
