import Link from 'next/link'
import { sayMark, type HalfMarks } from '@/lib/core/marks'

export type RunLine = Readonly<{ questionId: string; label: string; text: string; maximum: HalfMarks; answers: number; settled: number; open: number }>

function left({ answers, settled, open }: RunLine): string {
  if (answers === 0) return 'no answers yet'
  if (settled === answers) return 'done'
  return `${answers - settled} to do${open > 0 ? `, ${open} of them begun` : ''}`
}

/** The questions of a paper with what is left of each; the first that is not done is where to go on. */
export function RunTable({ paperId, runs }: { paperId: string; runs: readonly RunLine[] }) {
  const next = runs.find((run) => run.settled < run.answers)
  const asks = runs.some(({ text }) => text !== '')
  const path = (run: RunLine): string => `/papers/${paperId}/mark/${run.questionId}`
  return (
    <>
      <div className="mb-4 flex items-end gap-4">
        <h1>Mark</h1>
        {next && <Link className="btn lead ml-auto" href={path(next)}>Go on with {next.label}</Link>}
      </div>
      {runs.length === 0 && <p className="slip">No question of this paper is yours to mark. The paper’s owner says who marks what.</p>}
      {runs.length > 0 && (
        <table className="tbl">
          <thead><tr><th scope="col">Question</th>{asks && <th scope="col">Asks</th>}<th scope="col" className="num">Worth</th><th scope="col" className="num">Marked</th><th scope="col" className="pl-6">Left</th></tr></thead>
          <tbody>
            {runs.map((run) => (
              <tr key={run.questionId}>
                <td><Link href={path(run)} className="inline-block min-h-6 min-w-6 text-[length:var(--t-2)]" aria-label={`Question ${run.label}`}>{run.label}</Link></td>
                {asks && <td>{run.text || <span className="soft">–</span>}</td>}
                <td className="num">{sayMark(run.maximum)}</td>
                <td className="num">{run.settled} of {run.answers}</td>
                <td className="pl-6">{run === next ? <span className="swipe">{left(run)}</span> : left(run)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </>
  )
}
