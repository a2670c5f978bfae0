import { sayMark } from '@/lib/core/marks'
import type { ReturnedQuestion } from '@/lib/core/returned'
import styles from './returned.module.css'

/** What a question says in words: its points with what each earned, comments, and the model solution where it is handed back. */
export function QuestionWords({ question: { points, comments, modelSolution, remark } }: { question: ReturnedQuestion }) {
  return (
    <>
      {remark && <p className="soft">{remark}</p>}
      {points.length > 0 && (
        <ul className={styles.points}>
          {points.map(({ says, earned, worth }, k) => (
            <li key={k} className={earned === 0 ? 'soft' : undefined}><span>{says}{earned > 0 && earned < worth ? ', in part' : ''}</span><span>{sayMark(earned)}<span className="vh"> of {sayMark(worth)}</span></span></li>
          ))}
        </ul>
      )}
      {comments.map((comment, k) => <p key={k} className={styles.comment}>{comment}</p>)}
      {modelSolution && <p className={styles.model}><small>Model solution</small> {modelSolution}</p>}
    </>
  )
}
