import Link from 'next/link'
import { sayMark } from '@/lib/core/marks'
import type { SampleView } from '@/lib/core/second-marking'
import { sayDifference, sayStands } from '@/lib/core/say-difference'

/** The answers outside the tolerance, with what was decided. */
export function OutsideList({ paperId, sample }: Readonly<{ paperId: string; sample: SampleView }>) {
  const outside = sample.questions.flatMap(({ label, compared }) => compared.filter(({ within }) => !within).map((answer) => ({ label, ...answer })))
  if (outside.length === 0) return null
  return (
    <>
      <h3 className="mt-6">Outside the tolerance</h3>
      <table className="tbl">
        <thead><tr><th scope="col">Answer</th><th scope="col">First</th><th scope="col">Second</th><th scope="col">Difference</th><th scope="col">Decided</th><th scope="col"><span className="vh">Go on</span></th></tr></thead>
        <tbody>
          {outside.map(({ responseId, label, scriptNumber, first, second, decided, adjusted, open }) => (
            <tr key={responseId}>
              <th scope="row"><b className="book font-medium text-[length:var(--t-2)]">{label}</b> <span>script {scriptNumber}</span></th>
              <td>{sayMark(first)}</td><td>{sayMark(second)}</td><td>{sayDifference(first - second)}</td>
              <td>{decided ? sayStands[decided] : adjusted !== null && !open ? `Adjusted to ${sayMark(adjusted)}` : <b className="font-semibold">open</b>}</td>
              <td className="text-right"><Link className="btn plain" href={`/papers/${paperId}/second-mark/${responseId}`} aria-label={`Compare ${label} of script ${scriptNumber}`}>{open ? 'Decide' : 'Look again'}</Link></td>
            </tr>
          ))}
        </tbody>
      </table>
    </>
  )
}
