import type { Face } from '@/lib/typesetting/font-files'
import { setLine } from '@/lib/typesetting/set-line'
import type { Typesetter } from '@/lib/typesetting/typesetter'
import type { CodePlace } from './code-place'

const nameSizes = [8.5, 8, 7.5, 7, 6.5, 6]
const aboutSizes = [7, 6.5, 6, 5.5]
const cut = '…'

/** Whose page it is, in two small lines beside the code: the name, then number, class and page. What is too long gets smaller, then is cut. */
export function drawNameLine(
  { name, about }: { name: string; about: string }, { page, of }: { page: number; of: number }, { line, align }: CodePlace, pageHeight: number, type: Typesetter,
): string {
  const paged = of > 1 ? `${about}${about ? ' · ' : ''}page ${page} of ${of}` : about
  const rows = [
    { ...fitted(name, 'sans-strong', nameSizes, line.w, type), face: 'sans-strong', baseline: line.y + 8.5 },
    { ...fitted(paged, 'sans', aboutSizes, line.w, type), face: 'sans', baseline: line.y + 17.5 },
  ] as const
  return rows.map(({ words, size, face, baseline }) => {
    const x = align === 'right' ? line.x + line.w - type.width(words, face, size) : line.x
    return setLine(words, face, size, x, pageHeight - baseline, type)
  }).join('\n')
}

function fitted(words: string, face: Face, sizes: readonly number[], room: number, type: Typesetter): { words: string; size: number } {
  const size = sizes.find((each) => type.width(words, face, each) <= room)
  if (size !== undefined) return { words, size }
  const least = sizes.at(-1)!
  const letters = [...words]
  while (letters.length > 1 && type.width(letters.join('') + cut, face, least) > room) letters.pop()
  return { words: letters.join('').trimEnd() + cut, size: least }
}
