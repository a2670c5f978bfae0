import type { ReactNode } from 'react'
import { stageNames, type PaperStages, type StageName } from '@/lib/core/paper-stages'
import { StageLine } from '@/components/ui/stage-line'
import { TopBar } from '@/components/ui/top-bar'
import { stageWords } from './stage-words'

const ends: Record<StageName, string> = { Set: '/set', Scan: '/scan', Sort: '/sort', Mark: '', 'Second-mark': '/second-mark', 'Hand back': '/hand-back' }

type PaperFrameProps = Readonly<{
  stages: PaperStages
  now?: StageName
  /** What this screen has to say at the end of the top bar, and whose account it is. */
  end?: ReactNode
  children: ReactNode
}>

/** Top bar and stage line of every page of a paper; stages a person may not open are said, not led to. */
export function PaperFrame({ stages, now, end, children }: PaperFrameProps) {
  const { paperId, title, classes, counts, open } = stages
  const path = `/papers/${paperId}`
  const home = open.includes('Mark') ? path : open.includes('Second-mark') ? `${path}/second-mark` : undefined
  const line = stageNames.map((name) => ({ name, href: open.includes(name) ? `${path}${ends[name]}` : null, left: stageWords[name](counts) }))
  return (
    <>
      <TopBar where={[...(classes.length > 0 ? [{ label: classes.join(', ') }] : []), { label: title, href: home }]}>{end}</TopBar>
      <StageLine stages={line} now={now} />
      {children}
    </>
  )
}
