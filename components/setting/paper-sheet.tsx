'use client'
import Link from 'next/link'
import type { Dispatch } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import { StepChoice } from './step-choice'
import { WorthInput } from './worth-input'
import { numberBox } from './setting-edits'
import type { SetEvent, SetState } from './set-state'
import css from './set.module.css'

/** Beside the page while no space is in hand: how to begin, and the rules of the whole paper. */
export function PaperSheet({ state, send }: { state: SetState; send: Dispatch<SetEvent> }) {
  const { setting, view } = state
  const first = setting.questions.length === 0
  return (
    <>
      <h2>{first ? 'Draw the first answer space' : 'No answer space in hand'}</h2>
      <p className={css.lead}>{first ? 'Drag over the page where the first answer goes: from the printed question down to the end of its lines.' : 'Press a space to read and write its mark scheme, or drag over bare paper to draw another.'}</p>
      <dl className={css.keys}>
        <dt><KeyCap>Q</KeyCap></dt><dd>new answer space, then arrow keys move it and <KeyCap>⇧</KeyCap> arrows size it</dd>
        <dt><KeyCap>↵</KeyCap></dt><dd>to the scheme of the space, <KeyCap>Esc</KeyCap> back</dd>
        <dt><KeyCap>C</KeyCap></dt><dd>copy to the next question</dd>
        <dt><KeyCap>Z</KeyCap></dt><dd>undo, <KeyCap>⇧Z</KeyCap> redo</dd>
        <dt><KeyCap>+</KeyCap></dt><dd>larger, <KeyCap>−</KeyCap> smaller, <KeyCap>0</KeyCap> fits</dd>
        <dt><KeyCap>Alt</KeyCap></dt><dd>held while dragging: no snapping to print</dd>
      </dl>
      <h2>Rules of the paper</h2>
      <dl className={css.rules}>
        <dt>Marking step</dt><dd><StepChoice step={setting.step} send={send} /></dd>
        <dt>Tolerance</dt><dd className="flex items-baseline gap-2"><span className="w-12"><WorthInput label="Tolerance of the paper, in marks" least={0} disabled={view.sampled} worth={setting.tolerance} onWorth={(tolerance) => send({ type: 'ruled', patch: { tolerance } })} /></span> <span className="soft">{view.sampled ? 'fixed: a sample has been drawn' : 'between first and second mark'}</span></dd>
      </dl>
      <div className={css.acts}>
        <Link className="btn" href={`/papers/${view.paperId}/details`}>Classes, people, blank paper</Link>
        <Link className="btn" href={`/papers/${view.paperId}/print`}>Print with codes</Link>
        <a className="btn" href={`/api/papers/${view.paperId}/paper-file`} download>Save as paper.json</a>
      </div>
    </>
  )
}

/** The name box or the number boxes in hand. */
export function BoxSheet({ state, send }: { state: SetState; send: Dispatch<SetEvent> }) {
  const number = state.hand?.kind === 'number' ? numberBox(state.setting.boxes) : null
  return (
    <>
      <h2>{number ? 'Boxes for the candidate number' : 'Name box'}</h2>
      <p className={css.lead}>{number ? 'One box for each digit. They are read to suggest whose script it is; a person confirms.' : 'Where the student writes their name. Only this piece is shown when names are confirmed, and it is covered while marking.'}</p>
      {number && (
        <dl className={css.rules}>
          <dt>Digits</dt>
          <dd><input type="number" aria-label="Digits of the candidate number" min={1} max={12} value={number.digits} onChange={(event) => { const n = Math.round(Number(event.target.value)); if (n >= 1 && n <= 12) send({ type: 'divided', digits: n }) }} /></dd>
        </dl>
      )}
      <div className={css.acts}><button type="button" className="btn" onClick={() => send({ type: 'dropped' })}>Delete</button></div>
    </>
  )
}
