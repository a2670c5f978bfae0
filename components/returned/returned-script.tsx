'use client'
import { Download } from 'lucide-react'
import { useState } from 'react'
import { RingedMark } from '@/components/ui/ringed-mark'
import { sayDay } from '@/lib/core/say-day'
import { sayMark } from '@/lib/core/marks'
import type { ReturnedScriptView } from '@/lib/core/returned'
import { dayOf } from './my-scripts'
import { QuestionCards } from './question-cards'
import { QuestionList } from './question-list'
import { ScriptPages } from './script-pages'
import { usePdf } from './use-pdf'
import styles from './returned.module.css'

/** The returned script: results on the left, the pages in the middle, what each question says beside them; on a phone question by question. */
export function ReturnedScript({ script }: { script: ReturnedScriptView }) {
  const { id, detail, revision, handedBackAt } = script
  const pdf = usePdf(`/api/returned/${id}/pdf`, detail.pages.length)
  const [page, setPage] = useState(0)
  return (
    <main className={styles.wide}>
      <section className={styles.sum} aria-label="Result">
        <h1>{detail.givenName} {detail.familyName}</h1>
        <div className={styles.total}>
          <RingedMark mark={detail.total} pen={detail.pen} width={76} />
          <div>
            <p className={styles.big}>of {sayMark(detail.maximum)}{detail.grade === null ? (detail.percent === null ? '' : `, ${detail.percent}%`) : `, grade ${detail.grade}`}</p>
            {detail.gradeSays !== '' && <p className="dense soft">{detail.gradeSays}</p>}
          </div>
        </div>
        {detail.adjustments.map(({ says, by }, k) => <p key={k} className="dense">{says}: {by > 0 ? '+' : ''}{sayMark(by)}</p>)}
        <p className={styles.get}><a className="btn" href={`/api/returned/${id}/pdf`} download><Download className="ic" aria-hidden />Download as PDF</a></p>
        <p className="dense soft">Handed back {sayDay(dayOf(handedBackAt))}{revision > 1 ? `, revision ${revision}` : ''}</p>
        <QuestionList detail={detail} onPage={setPage} />
        {detail.next.length > 0 && (
          <div className={styles.next}>
            <h2>What to practise</h2>
            <ol>{detail.next.map((line) => <li key={line}>{line}</li>)}</ol>
          </div>
        )}
      </section>
      <ScriptPages detail={detail} pdf={pdf} page={page} onPage={setPage} />
      <QuestionCards detail={detail} pdf={pdf} />
    </main>
  )
}
