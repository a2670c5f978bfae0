import Link from 'next/link'
import { Fragment } from 'react'

export type Stage = Readonly<{ name: 'Set' | 'Scan' | 'Sort' | 'Mark' | 'Second-mark' | 'Hand back'; href: string; left: string }>

/** What is left at each stage in plain words and counts, leading to the next thing to do. */
export function StageLine({ stages, now }: { stages: readonly Stage[]; now?: Stage['name'] }) {
  return (
    <nav className="stages" aria-label="Stages of this paper">
      {stages.map((stage, k) => (
        <Fragment key={stage.name}>
          {k > 0 && <i aria-hidden />}
          <Link href={stage.href} aria-current={stage.name === now ? 'page' : undefined}>
            <b>{stage.name}</b> <span>{stage.left}</span>
          </Link>
        </Fragment>
      ))}
    </nav>
  )
}
