import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { MyScripts } from '@/components/returned/my-scripts'
import { TopBar } from '@/components/ui/top-bar'
import { env } from '@/lib/infra/env'
import { readMyScripts } from '@/lib/tasks/read-returned-script'

export const metadata = { title: 'My scripts' }

/** What was handed back to the student who is signed in. */
export default async function MyScriptsPage() {
  const scripts = await pageOf(readMyScripts(await actorOrSignIn()))
  return (
    <>
      <TopBar home="/my-scripts" where={[{ label: env.schoolName }, { label: 'My scripts' }]}><PersonEnd /></TopBar>
      <MyScripts scripts={scripts} />
    </>
  )
}
