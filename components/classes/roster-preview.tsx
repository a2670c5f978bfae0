import { Alarm } from '@/components/ui/alarm'
import type { ErrorLine } from '@/lib/core/errors'
import { sayCounts } from './say-counts'

type Step = Readonly<{ line: number; candidateNumber: string; givenName: string; familyName: string; email: string | null; does: 'new' | 'changed' | 'joins' | 'unchanged'; was: string | null }>
export type RosterCheck = Readonly<{ steps: readonly Step[]; faults: readonly ErrorLine[]; leftAlone: number }>
type RosterPreviewProps = Readonly<{ plan: RosterCheck; busy: boolean; onImport: () => void }>

const order = { changed: 0, joins: 1, new: 2, unchanged: 3 }

/** What importing would do. While a line is faulty only the faults are shown, and nothing can be imported. */
export function RosterPreview({ plan, busy, onImport }: RosterPreviewProps) {
  if (plan.faults.length > 0) return <Alarm code="roster_invalid" detail={{ lines: plan.faults }} />
  const count = (does: Step['does']) => plan.steps.filter((step) => step.does === does).length
  const counts = { new: count('new'), changed: count('changed'), joins: count('joins'), unchanged: count('unchanged'), leftAlone: plan.leftAlone }
  const todo = counts.new + counts.changed + counts.joins
  return (
    <section aria-label="What this list would do">
      <div className="mb-3 flex flex-wrap items-center gap-3">
        <p className="mr-auto font-medium">{sayCounts(counts, 'plan')}</p>
        <button className="btn lead" disabled={busy || todo === 0} onClick={onImport}>{todo === 0 ? 'Nothing to bring in' : `Bring in ${plan.steps.length} ${plan.steps.length === 1 ? 'line' : 'lines'}`}</button>
      </div>
      <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="Lines of the list">
        <table className="tbl">
          <thead><tr><th>Line</th><th>No.</th><th>Student</th><th>E-mail</th><th>What happens</th></tr></thead>
          <tbody>
            {plan.steps.toSorted((a, b) => order[a.does] - order[b.does] || a.line - b.line).map((step) => (
              <tr key={step.line} className={step.does === 'unchanged' ? 'soft' : undefined}>
                <td>{step.line}</td><td>{step.candidateNumber}</td><td className="whitespace-nowrap">{step.familyName}, {step.givenName}</td><td className="break-all">{step.email ?? 'none'}</td><td>{saysOf(step)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </section>
  )
}

function saysOf(step: Step): string {
  if (step.does === 'changed') return `changed, was ${step.was ?? ''}`
  if (step.does === 'joins') return 'known, joins this class'
  return step.does
}
