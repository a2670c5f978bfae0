'use client'
import { Alarm } from '@/components/ui/alarm'
import { sayTime } from '@/components/ui/say-time'
import { useOutcome } from '@/components/ui/use-outcome'
import { counted } from '@/components/paper/stage-words'
import type { ReleaseLine } from '@/lib/core/hand-back'
import type { HandBackActs } from './hand-back-screen'
import styles from './hand-back.module.css'

type BuildingProps = Readonly<{ release: ReleaseLine; classSetId: string | null; callOff: HandBackActs['callOff']; again: () => Promise<void> }>

/** Scripts as they are built, one drawn leaf each; or the day that they wait for. */
export function Building(props: BuildingProps) {
  const { dueAt, built } = props.release
  return dueAt !== null && built === 0 ? <Waiting {...props} dueAt={dueAt} /> : <InWork {...props} />
}

function Waiting({ release: { scripts }, classSetId, callOff, again, dueAt }: BuildingProps & { dueAt: number }) {
  const { busy, trouble, run } = useOutcome()
  return (
    <section aria-label="Waiting" className="mt-4 mb-8">
      <p className={styles.count}>{counted(scripts, 'script goes', 'scripts go')} to the students on {sayTime(dueAt)}.</p>
      <p className="soft mt-2 mb-4">They are built then, with the marks as they are then. A script that lacks a mark or a name by then stays here.</p>
      {trouble && <Alarm {...trouble} />}
      <button type="button" className="btn" disabled={busy} onClick={() => void run(callOff(classSetId!), again)}>Call it off</button>
    </section>
  )
}

function InWork({ release: { scripts, built }, classSetId }: BuildingProps) {
  return (
    <section aria-label="Progress" className="mt-4">
      <div className={styles.leaves} aria-hidden>
        {Array.from({ length: Math.min(scripts, 120) }, (_, k) => {
          const done = ((k + 1) / Math.min(scripts, 120)) * scripts <= built
          return <i key={k} className={done ? styles.done : k === Math.floor((built / scripts) * Math.min(scripts, 120)) ? styles.now : undefined} />
        })}
      </div>
      <p role="status" className={styles.count}>
        {built < scripts ? <span><span className="swipe">script {built + 1}</span> of {scripts}</span> : <span>All {scripts} built, handing them back</span>}
      </p>
      <p className="soft mt-3">You can leave this page: building goes on. Students see nothing before the last script is built. <a href={`/api/class-sets/${classSetId}/returned-zip`} download>The ZIP of all files</a> can be fetched already: each goes into it as it is built.</p>
    </section>
  )
}
