'use client'
import { useState } from 'react'
import { Alarm } from '@/components/ui/alarm'
import { useOutcome } from '@/components/ui/use-outcome'
import type { Outcome } from '@/lib/core/outcome'
import type { SampleView } from '@/lib/core/second-marking'
import { SelectField } from '@/components/ui/field'
import { sayDrawnAs } from '@/lib/core/say-difference'
import styles from './second-marking.module.css'

type SampledScriptsProps = Readonly<{ sample: SampleView; addScript: (raw: unknown) => Promise<Outcome<unknown>> }>

/** The scripts of the sample in reading order, and the way to add one; none is ever taken out. */
export function SampledScripts({ sample, addScript }: SampledScriptsProps) {
  const { scripts, addable, id } = sample
  const [chosen, setChosen] = useState('')
  const { busy, trouble, run } = useOutcome()
  const scriptId = addable.some((one) => one.scriptId === chosen) ? chosen : (addable[0]?.scriptId ?? '')
  return (
    <div>
      <h3>Scripts, in reading order</h3>
      <ol className={styles.scripts}>
        {scripts.map(({ scriptId: key, number, name, drawnAs, read, answers }) => (
          <li key={key}><span>{name ?? `Script ${number}`}</span>{drawnAs && <small className="soft">{sayDrawnAs[drawnAs]}</small>}<span>{read} of {answers}</span></li>
        ))}
      </ol>
      {addable.length > 0 && (
        <div className={styles.row}>
          <SelectField className={styles.size} label="Add a script" value={scriptId} onChange={(event) => setChosen(event.target.value)}>
            {addable.map((one) => <option key={one.scriptId} value={one.scriptId}>Script {one.number}</option>)}
          </SelectField>
          <button className="btn" disabled={busy} onClick={() => void run(addScript({ sampleId: id, scriptId }), () => undefined)}>Add it</button>
        </div>
      )}
      {trouble && <Alarm code={trouble.code} detail={trouble.detail} />}
    </div>
  )
}
