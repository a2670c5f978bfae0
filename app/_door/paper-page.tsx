import type { ReactNode } from 'react'
import { PaperFrame } from '@/components/paper/paper-frame'
import type { StageName } from '@/lib/core/paper-stages'
import { readStages } from '@/lib/tasks/read-stages'
import { pageOf } from './page-of'
import { PersonEnd } from './person-end'
import { actorOrSignIn } from './require-actor'

type PaperPageProps = Readonly<{ paperId: string; now?: StageName; end?: ReactNode; children: ReactNode }>

/** Around every page of a paper but the desk and the sorting table: `<PaperPage paperId={paperId} now="Scan">…</PaperPage>`. */
export async function PaperPage({ paperId, now, end, children }: PaperPageProps) {
  const stages = await pageOf(readStages(await actorOrSignIn(), paperId))
  return <PaperFrame stages={stages} now={now} end={<>{end}<PersonEnd /></>}>{children}</PaperFrame>
}
