import { Fragment, type MouseEvent } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import { penOf, type StampKind } from '@/lib/core/stamp'
import type { DeskState } from './desk-state'
import { codeKeys, stampKeys, type Command } from './keys'
import { StampIcon } from './stamp-icon'
import styles from './desk.module.css'

const names: Readonly<Partial<Record<StampKind, string>>> = { tick: 'Tick', half: 'Half tick', cross: 'Cross', ring: 'Ring', caret: 'Caret', underline: 'Underline', wavy: 'Wavy line', seen: 'Seen', note: 'Note' }
const order: readonly StampKind[] = ['tick', 'half', 'cross', 'ring', 'caret', 'underline', 'wavy', 'seen']
const pens = { first: ['Green pen', 'First mark'], second: ['Violet pen', 'Second mark'], agreed: ['Blue-black pen', 'Agreed mark'] } as const
const acts: readonly (readonly [Command & { do: 'nought' | 'nothing-written' | 'undo' | 'whole-page' | 'scheme' | 'up' | 'down' | 'settle' }, string, string])[] = [
  [{ do: 'nought' }, 'Nought', '0'], [{ do: 'nothing-written' }, 'Nothing written', 'R'], [{ do: 'undo' }, 'Undo', 'Z'], [{ do: 'whole-page' }, 'Whole page', 'P'], [{ do: 'scheme' }, 'Scheme', 'M'],
  [{ do: 'up' }, 'Back', '↑'], [{ do: 'down' }, 'Next', '↓'], [{ do: 'settle' }, 'Settle', '↵'],
]

type PenTrayProps = Readonly<{ state: DeskState; codeAwaited: boolean; onCommand: (command: Command) => void; onTakeUp: (pen: StampKind | null) => void }>

/** The stamps at hand along the bottom. Pressed with the mouse a stamp is taken up and goes where the page is pressed; by its key it drops at once. */
export function PenTray({ state, codeAwaited, onCommand, onTakeUp }: PenTrayProps) {
  const pen = penOf(state.run.round)
  const keyOf = (kind: StampKind): string => Object.entries(stampKeys).find(([, stamp]) => stamp === kind)![0].toUpperCase()
  // Keys go on meaning what they mean after a press with the mouse; focus by keyboard stays where it is.
  const pressed = (work: () => void) => (event: MouseEvent<HTMLButtonElement>): void => {
    if (event.detail > 0) event.currentTarget.blur()
    work()
  }
  const kinds = order.filter((kind) => kind !== 'half' || state.run.step === 1)
  return (
    <footer className={`${styles.tray} ${pen}`} role="toolbar" aria-label="Pen tray">
      <div className={styles.pen}><span><b>{pens[pen][0]}</b><br />{pens[pen][1]}</span></div>
      <div className={styles.sep} />
      <div>
        {kinds.map((kind) => (
          <button key={kind} type="button" aria-label={`${names[kind]}, key ${keyOf(kind)}`} aria-pressed={state.pen === kind} onClick={pressed(() => onTakeUp(state.pen === kind ? null : kind))}>
            <StampIcon kind={kind} scale={kind === 'seen' ? 1.35 : 1.2} /><KeyCap>{keyOf(kind)}</KeyCap>
          </button>
        ))}
        <button type="button" aria-label="Note, key N" aria-pressed={state.pen === 'note'} onClick={pressed(() => onTakeUp(state.pen === 'note' ? null : 'note'))}><span className={styles.word}>note</span><KeyCap>N</KeyCap></button>
      </div>
      <div className={styles.codes}>
        {Object.entries(codeKeys).slice(0, 3).map(([key, code]) => (
          <button key={key} type="button" aria-label={`Text code ${code}, keys stroke ${key}`} data-awaited={codeAwaited || undefined} onClick={pressed(() => onCommand({ do: 'code', code }))}><span className={styles.code}>{code}</span><KeyCap>{`/ ${key}`}</KeyCap></button>
        ))}
      </div>
      <div className={styles.sep} />
      <div className={styles.go}>
        {acts.map(([command, name, key]) => (
          <Fragment key={command.do}>
            <button type="button" onClick={pressed(() => onCommand(command))}><span>{name}</span><KeyCap>{key}</KeyCap></button>
          </Fragment>
        ))}
      </div>
    </footer>
  )
}
