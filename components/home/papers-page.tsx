import Link from 'next/link'
import { Fragment } from 'react'
import type { PaperLine } from '@/lib/core/paper-left'
import { sayDate } from '@/components/paper/say-date'
import { byClass, type HomeLine } from './by-class'
import css from './home.module.css'

type PapersPageProps = Readonly<{ lines: readonly PaperLine[]; mayMake: boolean; year: number }>

/** Papers by class on a ruled page: what is left to do, in words, and one link to the next thing. */
export function PapersPage({ lines, mayMake, year }: PapersPageProps) {
  return (
    <main className={css.pg}>
      <div className={`${css.ln} ${css.title}`}><span /><h1>Your papers</h1><p className="soft">{lines.length > 0 && 'what is left to do, by class'}</p></div>
      {lines.length === 0 && <Nothing mayMake={mayMake} />}
      {byClass(lines).map(({ className, lines: own }) => (
        <section key={className ?? ''} aria-label={className ?? 'No class yet'}>
          <div className={css.blank} aria-hidden />
          {own.map((each, k) => <Line key={`${each.line.classSetId ?? each.line.paperId} ${each.line.part}`} home={each} className={k === 0 ? (className ?? '–') : ''} year={year} />)}
        </section>
      ))}
    </main>
  )
}

const pageOfPart = { owner: '', marker: '', moderator: '/second-mark' }

function Line({ home: { line, left, inHand }, className, year }: { home: HomeLine; className: string; year: number }) {
  const title = <Link href={`/papers/${line.paperId}${pageOfPart[line.part]}`}>{line.title}</Link>
  const about = [line.satOn && sayDate(line.satOn, year), line.students > 0 && !left.done && `${line.students} ${line.students === 1 ? 'student' : 'students'}`].filter(Boolean).join(', ')
  return (
    <div className={`${css.ln} ${left.done ? css.done : ''}`}>
      {className ? <h2 className={css.cl}>{className}</h2> : <span />}
      <div className={css.ti}>{inHand ? <span className="swipe">{title}</span> : title}<small>{about}</small></div>
      <p className={css.le}>{left.words.map((word, k) => <Fragment key={k}>{typeof word === 'number' ? <b>{word}</b> : word}</Fragment>)}</p>
      <p className={css.do}>{left.next && <Link href={left.next.href} aria-label={`${left.next.label}: ${line.title}${line.className ? `, ${line.className}` : ''}`}>{left.next.label}</Link>}</p>
    </div>
  )
}

function Nothing({ mayMake }: { mayMake: boolean }) {
  if (!mayMake) {
    return <div className={`slip ${css.slip}`}><h2>Nothing waits for you</h2><p className="mt-2">Questions to mark and samples to read stand here once a teacher gives them to you.</p></div>
  }
  return (
    <div className={`slip ${css.slip}`}>
      <h2>Begin with a paper</h2>
      <p className="mt-2 mb-4">A paper is a test as it was printed. Give it a title and its PDF; then draw on its pages where the answers go.</p>
      <Link className="btn lead" href="/papers/new">New paper</Link>
    </div>
  )
}
