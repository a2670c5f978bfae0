import { sayMark } from '@/lib/core/marks'
import type { FigureRow, MarkFigures, ModerationFigures, WhyNone } from '@/lib/core/moderation-figures'
import { sayMean } from '@/lib/core/say-difference'
import { sayCoefficient, sayLimits, saySpread, sayWhy, sayWhyLong } from '@/lib/core/say-figure'
import styles from './figures.module.css'

/** The reasons for missing figures that occur in some rows, but for those that a dash says. */
function reasonsIn(rows: readonly FigureRow[]): WhyNone[] {
  const of = ({ sd, limits, kappaQuadratic, icc }: MarkFigures) => [sd.why, limits.why, kappaQuadratic.figure.why, icc.agreement.one.figure.why]
  return [...new Set(rows.flatMap(({ figures }) => of(figures)))].filter((why): why is WhyNone => why !== null && why !== 'no_pairs')
}

function Row({ row: { label, tolerance, figures } }: { row: FigureRow }) {
  const { n, few, exact, within } = figures
  return (
    <tr>
      <th scope="row">{label}</th>
      <td>{n}{n > 0 && few && <small className="soft"> few</small>}</td>
      <td>{n === 0 ? '–' : exact}</td>
      <td>{n === 0 || within === null ? '–' : <>{within}{tolerance !== null && <small className="soft"> ±{sayMark(tolerance)}</small>}</>}</td>
      <td>{sayMean(figures.meanDifference)}</td>
      <td>{saySpread(figures.sd)}</td>
      <td className="whitespace-nowrap">{sayLimits(figures.limits)}</td>
      <td>{sayCoefficient(figures.kappaLinear)}</td>
      <td>{sayCoefficient(figures.kappaQuadratic)}</td>
      <td>{sayCoefficient(figures.icc.agreement.one)}</td>
    </tr>
  )
}

/** Every figure of a sample by question, by marker and for the paper, n in each row. */
export function FiguresTable({ moderation: { questions, markers, answers, totals } }: { moderation: ModerationFigures }) {
  const groups: readonly (readonly [string, readonly FigureRow[]])[] = [['By question', questions], ['By first marker', markers], ['The paper', [answers, totals]]]
  const reasons = reasonsIn(groups.flatMap(([, rows]) => rows))
  return (
    <>
      <div className={styles.wide} tabIndex={0} role="group" aria-label="Figures by question, marker and paper">
        <table className={`tbl ${styles.figures}`}>
          <thead>
            <tr><th scope="col"><span className="vh">Of what</span></th><th scope="col">n</th><th scope="col">Same</th><th scope="col">Inside</th><th scope="col">Mean</th><th scope="col">SD</th><th scope="col">Limits of agreement</th><th scope="col">Kappa, linear</th><th scope="col">Kappa, quadratic</th><th scope="col">ICC</th></tr>
          </thead>
          {groups.map(([name, rows]) => (
            <tbody key={name}>
              <tr><th scope="rowgroup" colSpan={10} className={styles.group}>{name}</th></tr>
              {rows.map((row) => <Row key={row.key} row={row} />)}
            </tbody>
          ))}
        </table>
      </div>
      <p className="small soft mt-1">
        Mean, SD and limits in marks, first minus second. {reasons.map((why) => `“${sayWhy[why]}”: ${sayWhyLong[why]}.`).join(' ')}
        {[...questions, ...markers].some(({ figures: { n, few } }) => n > 0 && few) && ' “few”: under 15 pairs, too few to judge a marker by.'}
      </p>
    </>
  )
}
