import Link from 'next/link'
import { errorSentence } from '@/components/ui/error-sentence'
import { sheetsRead, type SheafProgress } from '@/lib/core/sheaf-progress'
import { DrawnLeaves } from './drawn-leaves'
import { counted, saidProgress, tally, timeLeft } from './sheaf-words'
import { StopReading } from './stop-reading'
import style from './scan.module.css'

type SheafSectionProps = Readonly<{ sheaf: SheafProgress; paperId: string; first: boolean; onAgain: () => void; onStopped: () => void }>

/** One sheaf: its leaves as they are read, then what was found in words and where to go next. */
export function SheafSection({ sheaf, paperId, first, onAgain, onStopped }: SheafSectionProps) {
  const Title = first ? 'h1' : 'h2'
  return (
    <section className={style.sheaf} aria-label={sheaf.name}>
      {sheaf.state === 'failed' && <Bang />}
      <Title>{titleOf(sheaf)}</Title>
      {sheaf.state === 'failed' && <p role="alert" className="mt-1.5 max-w-[44rem]">{errorSentence(sheaf.problem ?? 'failed', sheaf.problemDetail)} {safe(sheaf)}</p>}
      <DrawnLeaves sheaf={sheaf} />
      <p className={style.count}><Count sheaf={sheaf} /></p>
      <p className="vh" role="status">{saidProgress(sheaf)}</p>
      {sheaf.leaves.length > 0 && (
        <table className={style.tally}>
          <tbody>
            {tally(sheaf).map(({ what, count, says }) => <tr key={what}><th scope="row">{what}</th><td>{count}</td><td>{says}</td></tr>)}
          </tbody>
        </table>
      )}
      <Next {...{ sheaf, paperId, first, onAgain, onStopped }} />
    </section>
  )
}

function titleOf({ state, name }: SheafProgress): string {
  if (state === 'failed') return `${name} could not be read to the end`
  return state === 'placed' ? `${name} is read` : `Reading ${name}`
}

function safe({ leaves }: SheafProgress): string {
  return `${leaves.length > 0 ? `${counted(leaves.length, 'leaf is', 'leaves are')} read and safe. ` : ''}The file itself is kept as it came.`
}

function Count({ sheaf }: { sheaf: SheafProgress }) {
  const { state, leaves, leafCount, secondsLeft } = sheaf
  const read = sheetsRead(leaves)
  if (state === 'placed') return <span>{counted(leafCount, 'leaf', 'leaves')} read{leaves.length > leafCount ? `, ${leaves.length} pages on them` : ''}</span>
  if (state === 'failed') return <span>{read} of {leafCount} leaves read</span>
  if (state === 'waiting') return <><span>{counted(leafCount, 'leaf', 'leaves')}</span><span className="soft">waiting for its turn</span></>
  if (read >= leafCount) return <span>All {leafCount} leaves read, putting them into scripts</span>
  return <><span><span className="swipe">leaf {read + 1}</span> of {leafCount}</span><span>{secondsLeft === null ? '' : timeLeft(secondsLeft)}</span></>
}

function Next({ sheaf, paperId, first, onAgain, onStopped }: SheafSectionProps) {
  if (sheaf.state === 'failed') return <div className={style.row}><button type="button" className="btn" onClick={onAgain}>Read it again</button><StopReading sheaf={sheaf} onStopped={onStopped} /></div>
  if (sheaf.state !== 'placed') return (
    <>
      <div className={style.row}>
        {sheaf.scripts > 0 && <Link className={`btn ${first ? 'lead' : ''}`} href={`/papers/${paperId}/mark`}>Begin to mark</Link>}
        <StopReading sheaf={sheaf} onStopped={onStopped} />
      </div>
      <p className="soft mt-3">{sheaf.scripts > 0 ? `${counted(sheaf.scripts, 'script is', 'scripts are')} whole and can be marked already; the others follow.` : 'You can leave this page: reading goes on, and what is read is kept.'}</p>
    </>
  )
  const loose = sheaf.leaves.filter(({ look }) => look === 'loose' || look === 'unreadable').length
  return (
    <div className={style.row}>
      <Link className={`btn ${first ? 'lead' : ''}`} href={`/papers/${paperId}/sort`}>{loose > 0 ? `Sort ${counted(loose, 'loose sheet')} and the names` : 'To the sorting table'}</Link>
    </div>
  )
}

function Bang() {
  return (
    <svg className={`mark-ring ${style.bang}`} width="50" height="34" viewBox="0 0 44 30" aria-hidden>
      <path d="M36.5 5.2C28 -.4 4.6 -1.2 2.2 13.6C.4 28.4 40.6 31.6 42.2 15.8C43 5.6 30.4 1.6 19.6 3" />
      <text x="22" y="21">!</text>
    </svg>
  )
}
