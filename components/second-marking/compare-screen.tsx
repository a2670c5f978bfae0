'use client'
import Link from 'next/link'
import { useRouter } from 'next/navigation'
import { useEffect, useEffectEvent, useRef, useState, type CSSProperties, type ReactNode } from 'react'
import { StampedPicture } from '@/components/paper/stamped-picture'
import { Alarm } from '@/components/ui/alarm'
import { KeyCap } from '@/components/ui/key-cap'
import { RingedMark } from '@/components/ui/ringed-mark'
import { TopBar } from '@/components/ui/top-bar'
import { useOutcome } from '@/components/ui/use-outcome'
import { sayMark } from '@/lib/core/marks'
import type { Outcome } from '@/lib/core/outcome'
import { decisionReasons, type Comparison, type Stands } from '@/lib/core/second-marking'
import { ComparedSide } from './compared-side'
import { DifferenceDots } from './difference-dots'
import { reasonWords, sayApart, sayCaution, sayReason, sayStands } from '@/lib/core/say-difference'
import styles from './second-marking.module.css'

type CompareScreenProps = Readonly<{
  comparison: Comparison
  acts: Readonly<{ decide: (raw: unknown) => Promise<Outcome<void>>; beginAgreed: (raw: unknown) => Promise<Outcome<{ markingId: string }>> }>
  end: ReactNode
}>

/** Height over width up to which an answer is flat enough to lie over the other at full width; taller ones stand side by side. */
const flat = 0.3

/** First and second mark of one answer beside each other, and the decision which of them, or an agreed one, counts. */
export function CompareScreen({ comparison, acts, end }: CompareScreenProps) {
  const { paperId, question, responseId, first, second, agreed, pictures, tolerance, within, decided, figures, before, after } = comparison
  const router = useRouter()
  const { busy, trouble, run } = useOutcome()
  // Inside the tolerance both marks are defensible; outside, somebody has to say why.
  const [reason, setReason] = useState(within ? 'judgement' : '')
  const [asked, setAsked] = useState(false)
  const reasons = useRef<HTMLSelectElement>(null)
  const list = `/papers/${paperId}/second-mark`

  function decide(stands: Stands) {
    if (busy) return
    if (reason === '') {
      setAsked(true)
      return reasons.current?.focus()
    }
    void run(acts.decide({ responseId, stands, reason }), () => undefined)
  }
  function agree() {
    if (busy) return
    if (agreed?.settled) return decide('agreed')
    void run(acts.beginAgreed({ responseId, copyOf: second.markingId }), () => router.push(`/papers/${paperId}/mark/${question.id}?round=agreed&response=${responseId}`))
  }
  const onKey = useEffectEvent((event: KeyboardEvent) => {
    const on = event.target as HTMLElement
    if (event.ctrlKey || event.metaKey || event.altKey || ['SELECT', 'INPUT', 'TEXTAREA'].includes(on.tagName)) return
    const key = event.key.toLowerCase()
    if (key === 'g') decide('first')
    else if (key === 'v') decide('second')
    else if (key === 'enter' && !['BUTTON', 'A'].includes(on.tagName)) agree()
    else if (key === 'arrowup' && before) router.push(`${list}/${before}`)
    else if (key === 'arrowdown' && after) router.push(`${list}/${after}`)
    else return
    event.preventDefault()
  })
  useEffect(() => {
    const listen = (event: KeyboardEvent) => onKey(event)
    window.addEventListener('keydown', listen)
    return () => window.removeEventListener('keydown', listen)
  }, [])

  const caution = sayCaution(figures)
  const shape = pictures.reduce((sum, { rect: { w, h } }) => sum + h / w, 0)
  return (
    <div className={`${styles.compare} ${shape > 0 && shape <= flat ? styles.stacked : ''}`} style={{ '--shape': shape } as CSSProperties}>
      <TopBar where={[{ label: comparison.className }, { label: comparison.paperTitle }, { label: 'second marks', href: list }, { label: question.label }]}><span>Script {comparison.scriptNumber}</span>{end}</TopBar>
      <main className={styles.page}>
      <div className={styles.head}>
        <div className={styles.label}>{question.label}</div>
        <h1 className={styles.ask}>{question.text || 'First and second mark'}</h1>
        <div className={styles.of}>{sayMark(question.maximum)} {question.maximum <= 2 ? 'mark' : 'marks'}</div>
      </div>
      <div className={styles.two}>
        <div className={styles.inner}>
          <div className={styles.pair}>
            <ComparedSide title="First mark" says="green pen" marking={first} pictures={pictures} pen="first" />
            <ComparedSide title="Second mark" says="violet pen, blind" marking={second} pictures={pictures} pen="second" />
          </div>
          <div className={styles.verdict}>
            <b>{sayApart(first.mark, second.mark, tolerance)}</b>
            <span className={`soft dense ${styles.figures}`}>Blind second marks of {question.label} only, n = {figures.n}.{caution && ' Few scripts.'} First minus second:</span>
            <DifferenceDots figures={figures} now={first.mark - second.mark} />
          </div>
          {agreed && (
            <div className={styles.agreedStrip}>
              <div className={styles.who}><span className="swipe">{agreed.settled ? 'Agreed' : 'In work'}</span></div>
              <StampedPicture pictures={pictures} stamps={agreed.stamps} pen="agreed" name="Agreed mark" />
              <div className={styles.mark}><RingedMark mark={agreed.mark} pen="agreed" width={62} /><small className="soft">of {sayMark(question.maximum)}</small></div>
            </div>
          )}
          <div className={styles.settle}>
            <button className="btn lead" disabled={busy} onClick={agree}>{agreed ? (agreed.settled ? `Agree ${sayMark(agreed.mark)}` : 'Go on with the agreed mark') : 'Agree another mark'} <KeyCap>↵</KeyCap></button>
            <button className="btn" disabled={busy} onClick={() => decide('first')}>First mark stands, {sayMark(first.mark)} <KeyCap>G</KeyCap></button>
            <button className="btn" disabled={busy} onClick={() => decide('second')}>Second mark stands, {sayMark(second.mark)} <KeyCap>V</KeyCap></button>
            {agreed?.settled && <Link className="btn plain" href={`/papers/${paperId}/mark/${question.id}?round=agreed&response=${responseId}`}>Change the agreed mark</Link>}
            <label>Reason
              <select ref={reasons} value={reason} onChange={(event) => setReason(event.target.value)} aria-invalid={asked && reason === '' ? true : undefined}>
                <option value="" disabled>Choose one</option>
                {decisionReasons.map((one) => <option key={one} value={one}>{sayReason[one]}</option>)}
              </select>
            </label>
          </div>
          {asked && reason === '' && <p role="alert" className="line bad mt-2">! Say why first: choose a reason.</p>}
          {trouble && <Alarm code={trouble.code} detail={trouble.detail} />}
          <p className={`line ${styles.decided}`} aria-live="polite">
            <span>{decided ? `Decided: ${sayStands[decided.stands].toLowerCase()}, ${reasonWords(decided.reason).toLowerCase()}, ${decided.by}.` : within ? 'Nothing to decide: inside the tolerance the first mark stands.' : 'Not decided yet: the first mark counts meanwhile.'}</span>
            <span className={`ml-auto ${styles.walk}`}>
              {before && <Link href={`${list}/${before}`}>Back <KeyCap>↑</KeyCap></Link>}
              {after && <Link href={`${list}/${after}`}>Next <KeyCap>↓</KeyCap></Link>}
            </span>
          </p>
        </div>
      </div>
      </main>
    </div>
  )
}
