import Link from 'next/link'
import { sayMark } from '@/lib/core/marks'
import type { SampleQuestion, SampleView } from '@/lib/core/second-marking'
import { sayMean } from '@/lib/core/say-difference'
import styles from './second-marking.module.css'

/** Where comparing a question begins: what is outside and undecided first. */
function toCompare({ compared }: SampleQuestion): string | null {
  return (compared.find(({ open }) => open) ?? compared[0])?.responseId ?? null
}

type QuestionTableProps = Readonly<{ paperId: string; sample: SampleView }>

/** The sample by question: how far it is read, how far the marks agree, and the way on. */
export function QuestionTable({ paperId, sample }: QuestionTableProps) {
  return (
    <div className={styles.wideTable} tabIndex={0} role="group" aria-label="The sample by question">
      <table className="tbl">
        <thead><tr><th scope="col">Question</th><th scope="col">Of</th><th scope="col">Tolerance</th><th scope="col">Second-marked</th><th scope="col">Same</th><th scope="col">Inside</th><th scope="col">Mean, first minus second</th><th scope="col"><span className="vh">Go on</span></th></tr></thead>
        <tbody>
          {sample.questions.map((question) => {
            const { questionId, label, maximum, tolerance, read, answers, figures } = question
            const compare = toCompare(question)
            return (
              <tr key={questionId}>
                <th scope="row"><b className="book font-medium text-[length:var(--t-2)]">{label}</b></th>
                <td>{sayMark(maximum)}</td>
                <td>{sayMark(tolerance)}</td>
                <td>{read} of {answers}</td>
                <td>{figures.n === 0 ? '–' : `${figures.exact} of ${figures.n}`}</td>
                <td>{figures.n === 0 ? '–' : `${figures.within} of ${figures.n}`}</td>
                <td>{sayMean(figures.meanDifference)}</td>
                <td className="text-right whitespace-nowrap">
                  {sample.mine && sample.closedAt === null && read < answers && <Link className="btn mr-2" href={`/papers/${paperId}/mark/${questionId}?round=second`}>Second-mark {label}</Link>}
                  {compare && <Link className="btn plain" href={`/papers/${paperId}/second-mark/${compare}`} aria-label={`Compare the marks of ${label}`}>Compare</Link>}
                </td>
              </tr>
            )
          })}
        </tbody>
      </table>
    </div>
  )
}
