import Link from 'next/link'
import { Fragment, type ReactNode } from 'react'

export type Crumb = Readonly<{ label: string; href?: string }>
type TopBarProps = Readonly<{ where: readonly Crumb[]; home?: string; children?: ReactNode }>

/** The thin bar: where this is, and at the end what a screen has to say. */
export function TopBar({ where, home = '/', children }: TopBarProps) {
  return (
    <header className="bar">
      <Link href={home} aria-label="Sheafmark, all papers"><img className="logo" src="/logo.svg" alt="" /></Link>
      <nav className="where" aria-label="Where this is">
        {where.map((crumb, k) => (
          <Fragment key={k}>
            {k > 0 && <span aria-hidden>/</span>}
            {crumb.href ? <Link href={crumb.href}>{crumb.label}</Link> : crumb.label}
          </Fragment>
        ))}
      </nav>
      <div className="end">{children}</div>
    </header>
  )
}
