import { pathData, type Ink } from '@/lib/core/ink'
import { fontOf } from '@/lib/core/text-widths'

/** The part of a canvas context that ink needs; Konva's and the browser's both have it. */
type Brush = Pick<CanvasRenderingContext2D, 'fillStyle' | 'strokeStyle' | 'lineWidth' | 'lineCap' | 'lineJoin' | 'font' | 'textAlign' | 'textBaseline' | 'fill' | 'stroke' | 'fillText' | 'setLineDash' | 'save' | 'restore'> & { letterSpacing?: string }

/** The families of the page, as canvas type needs them: by name, not by variable. */
export type Families = Readonly<{ sans: string; book: string }>

export function familiesOfPage(): Families {
  const style = getComputedStyle(document.documentElement)
  const family = (name: string, fallback: string): string => style.getPropertyValue(name).trim() || fallback
  return { sans: `${family('--font-hyper', 'Verdana')}, ${family('--font-hyper-ext', 'Verdana')}, sans-serif`, book: `${family('--font-literata', 'Georgia')}, ${family('--font-literata-ext', 'Georgia')}, serif` }
}

/** Paints ink on a canvas whose unit is a paper point. Decides nothing: shape, place and size are the ink's. */
export function paintInk(brush: Brush, inks: readonly Ink[], colour: string, families: Families): void {
  brush.save()
  brush.fillStyle = colour
  brush.strokeStyle = colour
  for (const ink of inks) {
    if (ink.kind === 'filled') brush.fill(new Path2D(pathData(ink.path)))
    else if (ink.kind === 'line') {
      brush.lineWidth = ink.width
      brush.lineCap = ink.dash ? 'butt' : 'round'
      brush.lineJoin = 'round'
      brush.setLineDash(ink.dash ? [...ink.dash] : [])
      brush.stroke(new Path2D(pathData(ink.path)))
    } else {
      const { family, weight, italic } = fontOf[ink.font]
      brush.font = `${italic ? 'italic ' : ''}${weight} ${ink.size}px ${families[family]}`
      brush.textAlign = ink.anchor === 'middle' ? 'center' : ink.anchor
      brush.textBaseline = 'alphabetic'
      if ('letterSpacing' in brush) brush.letterSpacing = `${ink.spacing}px`
      brush.fillText(ink.text, ink.at.x, ink.at.y)
    }
  }
  brush.restore()
}
