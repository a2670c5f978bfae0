import Link from 'next/link'
import { RingedMark } from '@/components/ui/ringed-mark'
import { sayMark } from '@/lib/core/marks'
import type { ReturnedScriptLine } from '@/lib/core/returned'
import { sayDay } from '@/lib/core/say-day'
import styles from './returned.module.css'

/** A student's list, the newest on top. */
export function MyScripts({ scripts }: { scripts: readonly ReturnedScriptLine[] }) {
  return (
    <main className="page !max-w-[48rem]">
      <h1>My scripts</h1>
      {scripts.length === 0 ? (
        <div className="slip mt-6">
          <h2>Nothing handed back yet</h2>
          <p>When a teacher hands a test back, it stands here: your own pages, every mark, and what to practise.</p>
        </div>
      ) : (
        <ul className={styles.mine}>
          {scripts.map(({ id, title, className, satOn, revision, total, maximum, grade, pen, read, handedBackAt }) => (
            <li key={id}>
              <RingedMark mark={total} pen={pen} width={60} />
              <div>
                <h2><Link href={`/my-scripts/${id}`}>{title}</Link></h2>
                <p>of {sayMark(maximum)}{grade === null ? '' : `, grade ${grade}`}</p>
                <p className="dense soft">{className}, {sayDay(satOn)}. {read ? '' : 'New: '}{revision > 1 ? `handed back again ${sayDay(dayOf(handedBackAt))}, revision ${revision}` : `handed back ${sayDay(dayOf(handedBackAt))}`}</p>
              </div>
            </li>
          ))}
        </ul>
      )}
    </main>
  )
}

/** The date of a moment, as sayDay takes it. */
export function dayOf(at: number): string {
  return new Date(at).toISOString().slice(0, 10)
}
