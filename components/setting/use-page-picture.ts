'use client'
import { useEffect, useState } from 'react'
import type { PaperPage } from '@/lib/core/paper'
import { inkLines } from './ink-lines'
import type { SnapLines } from './snap'

export type PagePicture = Readonly<{ url: string; image: HTMLImageElement; lines: SnapLines }>
const noLines: SnapLines = { xs: [], ys: [] }
/** Enough to find lines of print, in pixels across the page. */
const across = 820

/** The picture of a page of the blank paper and the lines of its print; null while it comes, 'failed' when it cannot. */
export function usePagePicture(url: string | null, page: PaperPage | undefined): PagePicture | 'failed' | null {
  const [picture, setPicture] = useState<PagePicture | { url: string; failed: true } | null>(null)
  useEffect(() => {
    if (!url || !page) return
    const image = new Image()
    image.onload = () => setPicture({ url, image, lines: readLines(image, page) })
    image.onerror = () => setPicture({ url, failed: true })
    image.src = url
    return () => {
      image.onload = null
      image.onerror = null
    }
  }, [url, page])
  if (!picture || picture.url !== url) return null
  return 'failed' in picture ? 'failed' : picture
}

function readLines(image: HTMLImageElement, page: PaperPage): SnapLines {
  const canvas = document.createElement('canvas')
  canvas.width = across
  canvas.height = Math.round((across * page.height) / page.width)
  const context = canvas.getContext('2d', { willReadFrequently: true })
  if (!context) return noLines
  context.drawImage(image, 0, 0, canvas.width, canvas.height)
  const { data } = context.getImageData(0, 0, canvas.width, canvas.height)
  const grey = new Uint8Array(canvas.width * canvas.height)
  for (let k = 0; k < grey.length; k++) grey[k] = data[k * 4 + 1]!
  return inkLines({ width: canvas.width, height: canvas.height, data: grey }, page.width)
}
