import type { Face } from './font-files'
import { actualText, num } from './operators'
import type { Typesetter } from './typesetter'

/** One line of black type as operators, its left end and baseline in the page's user space. */
export function setLine(words: string, face: Face, size: number, x: number, y: number, type: Typesetter): string {
  let left = x
  const parts = type.runs(words, face).map(({ font, codes, width, means }) => {
    const shown = `/${font} ${num(size)} Tf 1 0 0 1 ${num(left)} ${num(y)} Tm <${codes}> Tj`
    left += width * size
    return actualText(means, shown)
  })
  return `0 g BT ${parts.join(' ')} ET`
}
