'use client'
import { useState, type Dispatch } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import { newId } from '@/lib/core/ids'
import { sayMark } from '@/lib/core/marks'
import type { Outcome } from '@/lib/core/outcome'
import type { SettingPoint, SettingQuestion } from '@/lib/core/setting'
import { freshIds } from './page-desk'
import { PointRows } from './point-rows'
import { QuestionRules } from './question-rules'
import { WithdrawDialog } from './withdraw-dialog'
import type { SetEvent, SetState } from './set-state'
import css from './set.module.css'

export type SetActs = Readonly<{
  takeQuestionOut: (given: { questionId: string; as: 'out' | 'full'; reason: string }) => Promise<Outcome<void>>
  putQuestionBack: (given: { questionId: string }) => Promise<Outcome<void>>
  takePointOut: (given: { questionId: string; pointId: string; reason: string }) => Promise<Outcome<void>>
  putPointBack: (given: { questionId: string; pointId: string }) => Promise<Outcome<void>>
}>

type SchemeSheetProps = Readonly<{ state: SetState; question: SettingQuestion; send: Dispatch<SetEvent>; acts: SetActs; reload: () => Promise<void> }>

/** The mark scheme of the question in hand, written like a printed one. */
export function SchemeSheet({ state, question, send, acts, reload }: SchemeSheetProps) {
  const [asking, setAsking] = useState<'question' | SettingPoint | null>(null)
  const { view, setting } = state
  const stamped = view.stamped.includes(question.id)
  const withdrawn = view.withdrawnQuestions[question.id]
  const saved = setting === view.setting
  const write = (patch: Partial<SettingQuestion>) => send({ type: 'wrote', patch })
  const half = question.points.some(({ id }) => view.stamped.includes(id)) ? 'marks have been given' : setting.step === 2 ? 'this paper is marked in whole marks' : null
  async function and(work: Promise<Outcome<void>>): Promise<Outcome<void>> {
    const answer = await work
    if (answer.ok) await reload()
    return answer
  }
  return (
    <>
      <h2 className={css.heading}><label htmlFor="scheme-label">Mark scheme of</label> <input id="scheme-label" value={question.label} maxLength={20} size={Math.max(3, question.label.length)} onChange={(event) => write({ label: event.target.value })} aria-label="Label of the question" /></h2>
      {withdrawn && (
        <p className={css.out}>Withdrawn: {withdrawn.as === 'out' ? 'left out of every total' : 'everyone has full marks'}. {withdrawn.reason}. <button type="button" className="btn plain" disabled={!saved} onClick={() => void and(acts.putQuestionBack({ questionId: question.id }))}>Bring it back</button></p>
      )}
      <textarea className={css.ask} rows={1} aria-label="Question text" placeholder="The question as it is printed" value={question.text} onChange={(event) => write({ text: event.target.value })} />
      <PointRows question={question} view={view} step={setting.step} send={send} onWithdraw={setAsking} onBringBack={(point) => void and(acts.putPointBack({ questionId: question.id, pointId: point.id }))} />
      <p className={css.half}>
        <button type="button" className="btn" disabled={half !== null} onClick={() => send({ type: 'halved', ids: [newId(), newId()] })}>Half for the working, half for the answer</button>
        {half && <span className="dense soft">{half}</span>}
      </p>
      <h2>Model solution</h2>
      <textarea className={css.model} rows={2} aria-label="Model solution" placeholder="Written as a good student would" value={question.modelSolution} onChange={(event) => write({ modelSolution: event.target.value })} />
      <h2>Rules of this question</h2>
      <QuestionRules state={state} question={question} send={send} />
      <div className={css.acts}>
        <button type="button" className="btn" onClick={() => send({ type: 'copied', ids: freshIds() })}><KeyCap>C</KeyCap> Copy to the next question</button>
        <button type="button" className="btn" aria-pressed={state.tool === 'more'} onClick={() => send({ type: 'chose', tool: 'more' })}>{question.label || 'It'} goes on elsewhere</button>
        {stamped && !withdrawn && <button type="button" className="btn" disabled={!saved} onClick={() => setAsking('question')}>Withdraw</button>}
        {(!stamped || question.spaces.length > 1) && <button type="button" className="btn" onClick={() => send({ type: 'dropped' })}>{question.spaces.length > 1 ? 'Take this space out' : 'Delete'}</button>}
      </div>
      {asking === 'question' && <WithdrawDialog title={`Withdraw question ${question.label}`} choice onClose={() => setAsking(null)} withdraw={(given) => and(acts.takeQuestionOut({ questionId: question.id, ...given }))} />}
      {asking && asking !== 'question' && (
        <WithdrawDialog title={`Withdraw this mark point, worth ${sayMark(asking.worth)}`} choice={false} onClose={() => setAsking(null)} withdraw={({ reason }) => and(acts.takePointOut({ questionId: question.id, pointId: asking.id, reason }))} />
      )}
    </>
  )
}
