'use client'
import type { Dispatch } from 'react'
import { sayMark, type HalfMarks } from '@/lib/core/marks'
import type { SettingQuestion } from '@/lib/core/setting'
import { placedIn, type SetEvent, type SetState } from './set-state'
import { StepChoice } from './step-choice'
import { WorthInput } from './worth-input'
import css from './set.module.css'

/** What holds for marking this question, line by line. */
export function QuestionRules({ state, question, send }: { state: SetState; question: SettingQuestion; send: Dispatch<SetEvent> }) {
  const at = placedIn(state.setting, state.hand)
  const own = question.tolerance !== null
  const fixed = state.view.sampled && state.view.setting.questions.some(({ id }) => id === question.id)
  const write = (patch: Partial<SettingQuestion>) => send({ type: 'wrote', patch })
  return (
    <dl className={css.rules}>
      <dt>Right answer</dt>
      <dd><textarea rows={1} aria-label="Right answer" value={question.answer} placeholder="in short, for quick looking" onChange={(event) => write({ answer: event.target.value })} /></dd>
      <dt>Note to markers</dt>
      <dd><textarea rows={1} aria-label="Note to markers" value={question.schemeNote} placeholder="units, rounding, what else counts" onChange={(event) => write({ schemeNote: event.target.value })} /></dd>
      <dt>Marking step</dt>
      <dd><StepChoice step={state.setting.step} send={send} /> <span className="soft">for the whole paper</span></dd>
      <dt>Tolerance</dt>
      <dd className="flex items-baseline gap-2">
        <select aria-label="Tolerance of this question" value={own ? 'own' : 'paper'} disabled={fixed} onChange={(event) => write({ tolerance: event.target.value === 'own' ? state.setting.tolerance : null })}>
          <option value="paper">{sayMark(state.setting.tolerance)}, as the paper</option><option value="own">of its own</option>
        </select>
        {own && <span className="w-12"><WorthInput label="Tolerance in marks" least={0} disabled={fixed} worth={question.tolerance ?? (0 as HalfMarks)} onWorth={(tolerance) => write({ tolerance })} /></span>}
        <span className="soft">{fixed ? 'fixed: a sample has been drawn' : 'first to second mark'}</span>
      </dd>
      <dt>Answer space</dt>
      <dd>{at ? `page ${at.page}, ${Math.round(at.rect.w)} × ${Math.round(at.rect.h)} pt` : 'none'}{question.spaces.length > 1 && `, one of ${question.spaces.length}`}</dd>
    </dl>
  )
}
