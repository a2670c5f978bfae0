import type { ReactNode } from 'react'
import { sayMark } from '@/lib/core/marks'
import type { DeskState } from './desk-state'
import { Ruler } from './ruler'
import styles from './desk.module.css'

/** The question, what it is worth, and the ruler of the run. */
export function DeskHead({ state, children }: { state: DeskState; children?: ReactNode }) {
  const { question, step, round } = state.run
  const marks = `${sayMark(question.maximum)} ${question.maximum <= 2 ? 'mark' : 'marks'}`
  return (
    <section className={styles.head} aria-label={`Question ${question.label}`}>
      <div className={styles.label} aria-hidden>{question.label}</div>
      <h1 className={styles.ask}><span className="vh">Question {question.label}. </span>{question.text || (question.answer ? `Answer: ${question.answer}` : `Question ${question.label}`)}</h1>
      <div className={styles.of}>{marks}, in {step === 1 ? 'halves' : 'whole marks'}</div>
      <div className={styles.rule}>
        <Ruler strips={state.strips} hand={state.hand} />
        <span className={styles.order}>{round === 'second' ? 'reading order of the sample' : 'fair order, drawn for this run'}</span>
      </div>
      {children}
    </section>
  )
}
