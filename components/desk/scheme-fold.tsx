import { KeyCap } from '@/components/ui/key-cap'
import { sayMark } from '@/lib/core/marks'
import type { DeskState } from './desk-state'
import styles from './desk.module.css'

const kinds = { M: 'method', A: 'answer, needs its method', B: 'independent' } as const

/** The scheme folded down beneath the question, for reading. */
export function SchemeFold({ question }: Pick<DeskState['run'], 'question'>) {
  const lines = (text: string): string[] => text.split('\n').map((line) => line.trim()).filter(Boolean)
  return (
    <aside className={styles.foldline} aria-label={`Mark scheme of ${question.label}`}>
      <div className={styles.fold}>
        <div className={styles.foldKey}><KeyCap>M</KeyCap> folds up</div>
        <div>
          <h2>Mark scheme</h2>
          {question.points.length === 0 && <p className="dense soft">No mark points: give plain ticks up to {sayMark(question.maximum)}.</p>}
          <dl>
            {question.points.map((point) => (
              <div key={point.id}>
                <dt>{point.label}<i aria-hidden /><b>{sayMark(point.worth)}</b></dt>
                {(point.note || point.kind) && <dd>{[point.kind ? `${point.kind}: ${kinds[point.kind]}` : '', point.note].filter(Boolean).join('; ')}</dd>}
              </div>
            ))}
          </dl>
        </div>
        <div>
          <h2>{question.modelSolution ? 'Model solution' : 'Answer'}</h2>
          <div className={styles.model}>{lines(question.modelSolution || question.answer || 'None written yet.').map((line, k) => <p key={k}>{line}</p>)}</div>
        </div>
        <div>
          <h2>Notes to the scheme</h2>
          <ul>{lines(question.schemeNote || 'None.').map((line, k) => <li key={k}>{line}</li>)}</ul>
        </div>
      </div>
    </aside>
  )
}
