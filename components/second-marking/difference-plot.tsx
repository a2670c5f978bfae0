import type { MarkFigures } from '@/lib/core/moderation-figures'
import { sayMark, type HalfMarks } from '@/lib/core/marks'
import { placePlot, type Plotted } from './place-plot'
import { sayDifference, sayMean } from '@/lib/core/say-difference'
import styles from './figures.module.css'

type DifferencePlotProps = Readonly<{ name: string; pairs: readonly Plotted[]; figures: MarkFigures; maximum: HalfMarks | null; tolerance: HalfMarks | null }>

/**
 * First minus second over the middle of both marks, with the mean, the limits of agreement and the tolerance. Rings lie inside the
 * tolerance, crosses outside; where several fall together their number stands beside.
 */
export function DifferencePlot({ name, pairs, figures, maximum, tolerance }: DifferencePlotProps) {
  const { width, height, left, right, top, bottom, x, y, across, up, spots, lines } = placePlot(pairs, figures, maximum, tolerance)
  const outside = spots.filter(({ inside }) => !inside).reduce((n, { times }) => n + times, 0)
  return (
    <svg className={styles.plot} viewBox={`0 0 ${width} ${height}`} role="img" aria-label={`Differences of ${name}, n = ${figures.n}: mean ${sayMean(figures.meanDifference)}${tolerance === null ? '' : `, ${outside} outside the tolerance`}. The table beside it has every value.`}>
      {tolerance !== null && <rect className={styles.band} x={left} width={right - left} y={y(tolerance)} height={y(-tolerance) - y(tolerance)} />}
      <line className={styles.axis} x1={left} x2={left} y1={top} y2={bottom} />
      <line className={styles.axis} x1={left} x2={right} y1={bottom} y2={bottom} />
      <line className={styles.nought} x1={left} x2={right} y1={y(0)} y2={y(0)} />
      {up.map((value) => <text key={value} x={left - 8} y={y(value) + 4} textAnchor="end">{sayDifference(value)}</text>)}
      {across.map((value) => <text key={value} x={x(value)} y={bottom + 18} textAnchor="middle">{sayMark(value as HalfMarks)}</text>)}
      <text x={(left + right) / 2} y={bottom + 38} textAnchor="middle" className={styles.name}>middle of both marks</text>
      <text x={left - 38} y={top - 8} className={styles.name}>first minus second</text>
      {lines.map(({ says, at, label }) => (
        <g key={says}>
          <line className={says === 'mean' ? styles.mean : styles.limit} x1={left} x2={right} y1={y(at)} y2={y(at)} />
          <text x={right + 8} y={label + 4}>{says} {sayMean(at)}</text>
        </g>
      ))}
      {spots.map(({ middle, difference, times, inside }) => (
        <g key={`${middle} ${difference}`} className={inside ? styles.ring : styles.cross} transform={`translate(${x(middle)} ${y(difference)})`}>
          {inside ? <circle r={4.5} /> : <path d="M-4.5-4.5 4.5 4.5M4.5-4.5-4.5 4.5" />}
          {times > 1 && <text x={7} y={-5}>{times}</text>}
        </g>
      ))}
    </svg>
  )
}
