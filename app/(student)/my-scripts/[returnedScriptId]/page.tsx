import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { ReturnedScript } from '@/components/returned/returned-script'
import { TopBar } from '@/components/ui/top-bar'
import { readReturnedScript } from '@/lib/tasks/read-returned-script'

export const metadata = { title: 'My script' }

/** One returned script: every mark where it was earned, and what to practise. */
export default async function ReturnedScriptPage({ params }: { params: Promise<{ returnedScriptId: string }> }) {
  const { returnedScriptId } = await params
  const script = await pageOf(readReturnedScript(await actorOrSignIn(), returnedScriptId))
  return (
    <>
      <TopBar home="/my-scripts" where={[{ label: 'My scripts', href: '/my-scripts' }, { label: script.detail.title }]}><PersonEnd /></TopBar>
      <ReturnedScript script={script} />
    </>
  )
}
