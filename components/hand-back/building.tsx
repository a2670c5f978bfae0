import type { ReleaseLine } from '@/lib/core/hand-back'
import styles from './hand-back.module.css'

/** Scripts as they are built, one drawn leaf each. */
export function Building({ release: { scripts, built }, classSetId }: { release: ReleaseLine; classSetId: string | null }) {
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
