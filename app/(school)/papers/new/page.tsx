import type { Metadata } from 'next'
import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { NewPaperForm } from '@/components/setting/new-paper-form'
import { TopBar } from '@/components/ui/top-bar'
import { now } from '@/lib/infra/clock'
import { env } from '@/lib/infra/env'
import { readNewPaper } from '@/lib/tasks/read-new-paper'

export const metadata: Metadata = { title: 'New paper' }

export default async function NewPaperPage() {
  const { classes } = await pageOf(readNewPaper(await actorOrSignIn()))
  return (
    <>
      <TopBar where={[{ label: env.schoolName, href: '/' }, { label: 'New paper' }]}><PersonEnd /></TopBar>
      <main className="page">
        <h1>New paper</h1>
        <p className="soft">A paper is the test itself. Its classes, pages and scheme can all be changed later.</p>
        <NewPaperForm classes={classes} today={new Date(now()).toISOString().slice(0, 10)} />
      </main>
    </>
  )
}
