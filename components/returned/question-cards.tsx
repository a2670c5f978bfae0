import { RingedMark } from '@/components/ui/ringed-mark'
import { sayMark } from '@/lib/core/marks'
import type { ReturnedDetail } from '@/lib/core/returned'
import { PagePicture } from './page-picture'
import { QuestionWords } from './question-words'
import type { OpenedPdf } from './use-pdf'
import styles from './returned.module.css'

/** Question by question, for narrow screens: the part of the page, what earned the mark, and a run of all questions to jump by. */
export function QuestionCards({ detail, pdf }: { detail: ReturnedDetail; pdf: OpenedPdf }) {
  return (
    <div className={styles.cards}>
      <nav className={styles.run} aria-label="Questions">
        {detail.questions.map(({ label, mark }) => <a key={label} href={`#question-${label}`}>{label}<span>{mark === null ? '–' : sayMark(mark)}</span></a>)}
      </nav>
      {detail.questions.map((question) => (
        <article key={question.label} id={`question-${question.label}`} aria-label={`Question ${question.label}`}>
          <header>
            <h2>{question.label}</h2>
            <p>{question.text}</p>
            {question.mark !== null && <RingedMark mark={question.mark} pen={question.pen} />}
          </header>
          {question.areas.map((area, k) => (
            <PagePicture key={k} pdf={pdf} page={area.page} shape={detail.pages[area.page]!.shape} area={area} name={`Your answer to ${question.label} with its marking`} />
          ))}
          <QuestionWords question={question} />
          <details><summary>This picture in words</summary>{question.words}.</details>
        </article>
      ))}
    </div>
  )
}
