import type { BlankPage } from '@/lib/core/grey-picture'
import type { PageImage } from '@/lib/core/leaf'

/**
 * Dots per inch of a leaf's stored image. What the sheaf says is taken when it makes the leaf about as large as the paper, up
 * to half as large again; otherwise (photographs, files that lie) the image is taken to show one page from edge to edge.
 */
export function scanDensity({ width, height, dpiX, dpiY }: PageImage, paper: readonly BlankPage[]): { dpiX: number; dpiY: number } {
  const sizes = paper.map(({ widthPoints, heightPoints }) => ({ long: Math.max(widthPoints, heightPoints) / 72, short: Math.min(widthPoints, heightPoints) / 72 }))
  const [w, h] = [width / dpiX, height / dpiY]
  const near = (said: number, should: number) => said > 0.8 * should && said < 1.5 * should
  if (sizes.length === 0 || sizes.some(({ long, short }) => near(Math.max(w, h), long) && near(Math.min(w, h), short))) return { dpiX, dpiY }
  const { long, short } = sizes[0]!
  const dpi = Math.max(Math.max(width, height) / long, Math.min(width, height) / short)
  return { dpiX: dpi, dpiY: dpi }
}
