import type { AgreementFigures } from '@/lib/core/second-marking'
import { sayDifference } from '@/lib/core/say-difference'
import styles from './second-marking.module.css'

type DifferenceDotsProps = Readonly<{ figures: AgreementFigures; now: number }>

/** One ring for each answer over its difference, first minus second; the answer in hand is filled. */
export function DifferenceDots({ figures, now }: DifferenceDotsProps) {
  const far = Math.max(2, ...figures.differences.map(({ difference }) => Math.abs(difference)))
  const steps = Array.from({ length: 2 * far + 1 }, (_, k) => k - far)
  const times = (step: number) => figures.differences.find(({ difference }) => difference === step)?.times ?? 0
  const said = figures.differences.map(({ difference, times: n }) => `${sayDifference(difference)} ${n === 1 ? 'once' : `${n} times`}`).join(', ')
  return (
    <div className={styles.dots} role="img" aria-label={`Differences, first minus second: ${said}`}>
      {steps.map((step) => (
        <div key={step}><u>{Array.from({ length: Math.min(times(step), 24) }, (_, k) => <i key={k} className={step === now && k === 0 ? styles.here : undefined} />)}</u><span>{sayDifference(step)}</span></div>
      ))}
    </div>
  )
}
