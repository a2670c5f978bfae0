import { sayMark, type HalfMarks } from '@/lib/core/marks'
import type { Coefficient, FigureRow } from '@/lib/core/moderation-figures'
import { sayMean } from '@/lib/core/say-difference'
import { sayCoefficient, sayInterval, sayMarksInterval, saySpread, sayWhy } from '@/lib/core/say-figure'
import styles from './figures.module.css'

/** Every figure of one row with its 95 % interval. */
export function FiguresInFull({ row: { label, figures } }: { row: FigureRow }) {
  const { limits, icc } = figures
  const coefficient = (name: string, one: Coefficient): [string, string, string] => [name, sayCoefficient(one), sayInterval(one)]
  const rows: readonly [string, string, string][] = [
    ['Mean, first minus second', sayMean(figures.meanDifference), sayMarksInterval(figures.meanInterval)],
    ['SD of the differences', saySpread(figures.sd), ''],
    ['Largest difference', figures.largest === null ? '–' : sayMark(figures.largest as HalfMarks), ''],
    ['Lower limit', limits.why === null ? sayMean(limits.low) : sayWhy[limits.why], limits.why === null ? sayMarksInterval(limits.lowInterval) : ''],
    ['Upper limit', limits.why === null ? sayMean(limits.high) : sayWhy[limits.why], limits.why === null ? sayMarksInterval(limits.highInterval) : ''],
    coefficient('Kappa, linear', figures.kappaLinear),
    coefficient('Kappa, quadratic', figures.kappaQuadratic),
    coefficient('ICC(2,1), agreement of one mark', icc.agreement.one),
    coefficient('ICC(3,1), consistency of one mark', icc.consistency.one),
    coefficient('ICC(1,1), any markers', icc.oneWay.one),
    coefficient('ICC(2,k), agreement of the mean of both', icc.agreement.mean),
    coefficient('ICC(3,k), consistency of the mean of both', icc.consistency.mean),
    coefficient('ICC(1,k), mean of any markers', icc.oneWay.mean),
  ]
  return (
    <details className={styles.full}>
      <summary>Every figure of {label}, with 95 % intervals</summary>
      <table className="tbl">
        <thead><tr><th scope="col">n = {figures.n}</th><th scope="col">Figure</th><th scope="col">95 % interval</th></tr></thead>
        <tbody>{rows.map(([name, value, interval]) => <tr key={name}><th scope="row">{name}</th><td>{value}</td><td className="whitespace-nowrap">{interval}</td></tr>)}</tbody>
      </table>
      <p className="small soft mt-1">Kappa is weighted over all possible marks, its interval by its standard error; the intervals of mean and limits are by Student’s t, those of ICC by F.</p>
    </details>
  )
}
