import fontkit from '@pdf-lib/fontkit'
import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { join } from 'node:path'
import { unpackWoff } from './unpack-woff'

/** The faces of a returned script. */
export type Face = 'sans' | 'sans-strong' | 'sans-bold' | 'book' | 'book-italic'
/** A font file of one face or of what stands in for it, by package path. */
export type FontFile = string
export type ReadFont = ReturnType<typeof fontkit.create>

const sans = (weight: number): FontFile[] => ['latin', 'latin-ext'].map((part) => `@fontsource/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-${part}-${weight}-normal.woff`)
const book = (style: 'normal' | 'italic'): FontFile[] =>
  ['latin', 'latin-ext', 'greek', 'cyrillic', 'cyrillic-ext', 'vietnamese'].map((part) => `@fontsource/literata/files/literata-${part}-500-${style}.woff`)
// Only this one has roots, arrows and relations, which teachers of mathematics write all day, and the box that stands for a letter in no face.
const mathematics: FontFile = '@fontsource/noto-sans-math/files/noto-sans-math-latin-400-normal.woff'

/** Where a letter is looked for, in order: the face itself, then Literata for alphabets the sans lacks, then mathematics. */
export const filesOf: Readonly<Record<Face, readonly FontFile[]>> = {
  sans: [...sans(400), ...book('normal'), mathematics],
  'sans-strong': [...sans(600), ...book('normal'), mathematics],
  'sans-bold': [...sans(700), ...book('normal'), mathematics],
  book: [...book('normal'), mathematics],
  'book-italic': [...book('italic'), ...book('normal'), mathematics],
}

const read = new Map<FontFile, ReadFont>()

/** A font file of an installed package, read once for the life of the process. */
export function fontOfFile(file: FontFile): ReadFont {
  const known = read.get(file)
  if (known) return known
  // Resolved from where the program was started, so that it also holds when this file has been bundled.
  const path = createRequire(join(process.cwd(), 'package.json')).resolve(file)
  const font = fontkit.create(unpackWoff(readFileSync(path)))
  // Letter by letter: these scripts need no shaping, and looking for kerning that PDF drawing then leaves out took most of a build's time.
  font.layout = (text: string) => ({ glyphs: [...text].map((letter) => font.glyphForCodePoint(letter.codePointAt(0)!)) }) as ReturnType<ReadFont['layout']>
  read.set(file, font)
  return font
}
