'use client'
import { useState, type FormEvent } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { Field, SelectField } from '@/components/ui/field'
import { faultOf, useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import type { SampleOffer } from '@/lib/core/second-marking'
import { counted } from '@/components/paper/stage-words'
import styles from './second-marking.module.css'

type DrawFormProps = Readonly<{ offer: SampleOffer; another: boolean; draw: (raw: unknown) => Promise<Outcome<unknown>> }>

/** What stands in the way of drawing, in words; null when nothing does. */
function inTheWay({ scripts, toMark, moderators }: SampleOffer): string | null {
  if (scripts === 0) return 'No script has been scanned yet.'
  if (toMark > 0) return `${counted(toMark, 'answer still lacks', 'answers still lack')} a first mark.`
  return moderators.length === 0 ? 'Nobody else with the role of moderator could mark this class set blind. Ask the school’s admin to give someone the role.' : null
}

/** Names the moderator and draws the sample of one class set. */
export function DrawForm({ offer, another, draw }: DrawFormProps) {
  const { className, classSetId, scripts, defaultSize, moderators } = offer
  const [moderatorId, setModeratorId] = useState(moderators[0]?.userId ?? '')
  const [size, setSize] = useState(String(offer.size))
  const { busy, trouble, run } = useOutcome()
  const why = inTheWay(offer)
  function onSubmit(event: FormEvent) {
    event.preventDefault()
    void run(draw({ classSetId, moderatorId, size: Number(size) }), () => undefined)
  }
  return (
    <section className={styles.sample} aria-labelledby={`draw-${classSetId}`}>
      <h2 id={`draw-${classSetId}`} className="cap">{another ? `Another sample of ${className}` : `A sample of ${className}`}<small>{counted(scripts, 'script', 'scripts')}</small></h2>
      <p className="dense soft mt-2">The highest and the lowest total are always in it, the rest lies evenly between by lot, and every marker of every question is seen. It is marked blind: no first mark, stamp, comment or name is shown.</p>
      <form className={styles.row} onSubmit={onSubmit}>
        <SelectField label="Moderator" value={moderatorId} onChange={(event) => setModeratorId(event.target.value)} disabled={why !== null}>
          {moderators.map(({ userId, name }) => <option key={userId} value={userId}>{name}</option>)}
        </SelectField>
        <Field className={styles.size} label={`Scripts (usual: ${defaultSize})`} type="number" min={1} max={Math.max(1, scripts)} value={size} onChange={(event) => setSize(event.target.value)} disabled={why !== null} bad={faultOf(trouble, 'size')} />
        <button className={another ? 'btn' : 'btn lead'} disabled={why !== null || busy}>Draw the sample</button>
        {why && <span className="line">{why}</span>}
      </form>
      {trouble && <Alarm code={trouble.code} detail={trouble.detail} />}
    </section>
  )
}
