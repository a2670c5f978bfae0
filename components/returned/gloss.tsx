'use client'
import { useEffect, useRef } from 'react'
import type { ReturnedQuestion } from '@/lib/core/returned'
import { QuestionWords } from './question-words'
import styles from './returned.module.css'

const gap = 12

/** What is said of each question of a page, beside where it stands; where one comment is long the next ones move down. */
export function Gloss({ questions, picture }: { questions: readonly ReturnedQuestion[]; picture: React.RefObject<HTMLDivElement | null> }) {
  const column = useRef<HTMLElement>(null)
  const inOrder = [...questions].sort((a, b) => a.areas.at(-1)!.y - b.areas.at(-1)!.y)
  const tops = inOrder.map(({ areas }) => areas.at(-1)!.y).join()
  useEffect(() => {
    const page = picture.current
    const lines = column.current
    if (!page || !lines) return
    const place = () => {
      let filled = 0
      ;[...lines.children].forEach((line, k) => {
        const wanted = Number(tops.split(',')[k]) * page.clientHeight
        const top = Math.max(k === 0 ? 0 : gap, wanted - filled)
        ;(line as HTMLElement).style.marginTop = `${top}px`
        filled += top + (line as HTMLElement).offsetHeight
      })
    }
    const watch = new ResizeObserver(place)
    watch.observe(page)
    watch.observe(lines)
    return () => watch.disconnect()
  }, [tops, picture])
  return (
    <section ref={column} className={styles.gloss} aria-label="Comments">
      {inOrder.map((question) => <div key={question.label}><b>{question.label}</b><div><QuestionWords question={question} /></div></div>)}
    </section>
  )
}
