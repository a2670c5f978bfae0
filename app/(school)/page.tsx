import Link from 'next/link'
import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { PapersPage } from '@/components/home/papers-page'
import { TopBar } from '@/components/ui/top-bar'
import { now } from '@/lib/infra/clock'
import { env } from '@/lib/infra/env'
import { readPapers } from '@/lib/tasks/read-papers'

export default async function HomePage() {
  const { lines, mayMake } = await pageOf(readPapers(await actorOrSignIn()))
  return (
    <>
      <TopBar where={[{ label: env.schoolName }]}>{mayMake && <Link href="/papers/new">New paper</Link>}<PersonEnd /></TopBar>
      <PapersPage lines={lines} mayMake={mayMake} year={new Date(now()).getFullYear()} />
    </>
  )
}
