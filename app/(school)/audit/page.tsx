import type { Metadata } from 'next'
import Link from 'next/link'
import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { AuditTable } from '@/components/audit/audit-table'
import { TopBar } from '@/components/ui/top-bar'
import { env } from '@/lib/infra/env'
import { readAudit } from '@/lib/tasks/read-audit'

export const metadata: Metadata = { title: 'Audit lines' }

export default async function AuditPage({ searchParams }: { searchParams: Promise<{ before?: string }> }) {
  const before = Number((await searchParams).before)
  const { lines, older } = await pageOf(readAudit(await actorOrSignIn(), Number.isSafeInteger(before) && before > 0 ? before : undefined))
  return (
    <>
      <TopBar where={[{ label: env.schoolName, href: '/' }, { label: 'Audit lines' }]}><PersonEnd /></TopBar>
      <main className="page">
        <h1>Audit lines</h1>
        <p className="soft mb-4">Who did what, newest first. Ids and values only; nothing changes or removes a line.</p>
        {lines.length === 0 ? <p className="slip">Nothing has been done yet.</p> : <AuditTable lines={lines} />}
        <nav className="mt-4 flex gap-4" aria-label="Pages of audit lines">
          {before > 0 && <Link className="btn" href="/audit">Newest</Link>}
          {older !== null && <Link className="btn" href={`/audit?before=${older}`}>Older lines</Link>}
        </nav>
      </main>
    </>
  )
}
