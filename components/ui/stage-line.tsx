import Link from 'next/link'
import { Fragment } from 'react'
import type { StageName } from '@/lib/core/paper-stages'

/** `href` null: this person may not open the stage, only read how it stands. */
export type Stage = Readonly<{ name: StageName; href: string | null; left: string }>

/** What is left at each stage in plain words and counts, leading to the next thing to do. */
export function StageLine({ stages, now }: { stages: readonly Stage[]; now?: StageName }) {
  return (
    <nav className="stages" aria-label="Stages of this paper">
      {stages.map(({ name, href, left }, k) => (
        <Fragment key={name}>
          {k > 0 && <i aria-hidden />}
          {href === null
            ? <span className="stage"><b>{name}</b> <span>{left}</span></span>
            : <Link className="stage" href={href} aria-current={name === now ? 'page' : undefined}><b>{name}</b> <span>{left}</span></Link>}
        </Fragment>
      ))}
    </nav>
  )
}
