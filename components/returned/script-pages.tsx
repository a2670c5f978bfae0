'use client'
import { useRef, useState } from 'react'
import type { ReturnedDetail } from '@/lib/core/returned'
import { Gloss } from './gloss'
import { PagePicture } from './page-picture'
import type { OpenedPdf } from './use-pdf'
import styles from './returned.module.css'

type ScriptPagesProps = Readonly<{ detail: ReturnedDetail; pdf: OpenedPdf; page: number; onPage: (page: number) => void }>

/** The pages as tabs, what was said of each question beside them, and all of it in words. */
export function ScriptPages({ detail, pdf, page, onPage }: ScriptPagesProps) {
  const [inWords, setInWords] = useState(false)
  const picture = useRef<HTMLDivElement>(null)
  const shown = detail.pages[page] ?? detail.pages[0]
  return (
    <>
      <section className={styles.script} aria-label="Pages">
        <div className={`tabs ${styles.tabs}`}>
          {detail.pages.map((_, k) => <button key={k} type="button" aria-current={!inWords && k === page ? 'page' : undefined} onClick={() => { setInWords(false); onPage(k) }}>Page {k + 1}</button>)}
          <button type="button" aria-current={inWords ? 'page' : undefined} onClick={() => setInWords(true)}>In words</button>
          <span className="soft">as you wrote it, with the marking</span>
        </div>
        {inWords && <div className={styles.inWords}>{detail.pages.map(({ words }, k) => <p key={k}>{words}</p>)}</div>}
        {!inWords && shown && <div ref={picture}><PagePicture key={page} pdf={pdf} page={page} shape={shown.shape} name={`Page ${page + 1} with its marking; see In words`} /></div>}
      </section>
      {!inWords && shown && <Gloss picture={picture} questions={detail.questions.filter(({ areas }) => areas.at(-1)?.page === page)} />}
    </>
  )
}
