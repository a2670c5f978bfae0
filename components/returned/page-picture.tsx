'use client'
import { useEffect, useRef, useState } from 'react'
import type { AnswerArea } from '@/lib/core/returned'
import type { OpenedPdf } from './use-pdf'
import styles from './returned.module.css'

type PagePictureProps = Readonly<{ pdf: OpenedPdf; page: number; shape: number; name: string; area?: Omit<AnswerArea, 'page'> }>

/** A page of the returned file drawn as wide as its place, or one part of it. What it shows stands in words elsewhere: `name` says where. */
export function PagePicture({ pdf, page, shape, name, area }: PagePictureProps) {
  const frame = useRef<HTMLDivElement>(null)
  const canvas = useRef<HTMLCanvasElement>(null)
  const [width, setWidth] = useState(0)
  const [drawn, setDrawn] = useState(false)
  useEffect(() => {
    const watch = new ResizeObserver(([entry]) => setWidth(Math.round(entry!.contentRect.width)))
    watch.observe(frame.current!)
    return () => watch.disconnect()
  }, [])
  const { x, y, w, h } = area ?? { x: 0, y: 0, w: 1, h: 1 }
  useEffect(() => {
    if (pdf.state !== 'open' || width === 0) return
    let task: { cancel: () => void } | null = null
    let left = false
    void (async () => {
      const found = await pdf.document.getPage(pdf.firstPage + page)
      if (left || !canvas.current) return
      const sharp = Math.min(3, Math.max(1, window.devicePixelRatio))
      const unit = found.getViewport({ scale: 1 })
      const scale = (width * sharp) / (unit.width * w)
      const viewport = found.getViewport({ scale, offsetX: -x * unit.width * scale, offsetY: -y * unit.height * scale })
      canvas.current.width = Math.round(width * sharp)
      canvas.current.height = Math.round(unit.height * h * scale)
      const render = found.render({ canvas: canvas.current, viewport })
      task = render
      await render.promise.then(() => setDrawn(true), () => undefined)
    })()
    return () => {
      left = true
      task?.cancel()
    }
  }, [pdf, page, width, x, y, w, h])
  return (
    <div ref={frame} className={`sheet ${styles.picture}`} style={{ aspectRatio: `${(shape * w) / h}` }} role="img" aria-label={name} aria-busy={!drawn && pdf.state !== 'failed'}>
      {pdf.state === 'failed' ? <p className="dense p-4">The picture could not be drawn here. Download the PDF: it holds the same page.</p> : <canvas ref={canvas} aria-hidden />}
      {pdf.state !== 'failed' && !drawn && <p className={styles.drawing}>Drawing the page</p>}
    </div>
  )
}
