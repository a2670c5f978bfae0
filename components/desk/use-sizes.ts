'use client'
import { useEffect, useState } from 'react'

/** The width of a whole strip and of the margins beside it, in CSS pixels, and device pixels to each. */
export type Sizes = Readonly<{ strip: number; margin: number; density: number }>

const widest = 760
const narrowScreen = 1100
const finenesses = [72, 100, 120, 150, 200, 240, 300]

function sizesOf(width: number, density: number): Sizes {
  const margin = width > narrowScreen ? 104 : 76
  return { strip: Math.min(widest, Math.max(280, width - 2 * margin - 8)), margin, density }
}

/** Sizes of the desk for the window as it is. */
export function useSizes(): Sizes {
  const [sizes, setSizes] = useState(() => sizesOf(1440, 1))
  useEffect(() => {
    const measure = (): void => setSizes(sizesOf(document.documentElement.clientWidth, window.devicePixelRatio || 1))
    measure()
    window.addEventListener('resize', measure)
    return () => window.removeEventListener('resize', measure)
  }, [])
  return sizes
}

/** The address of a picture sharp at `width` CSS pixels for `points` of paper: of the resolutions the server draws, the next finer one. */
export function sharpSrc(src: string, width: number, points: number, density: number): string {
  const dpi = (width * density * 72) / points
  return `${src}&dpi=${finenesses.find((fineness) => fineness >= dpi * 0.94) ?? 300}`
}
