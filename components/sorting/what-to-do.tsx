import type { SortScript } from '@/lib/core/sorting'
import { AllScripts } from './all-scripts'
import { CertainNames } from './certain-names'
import { KeptLeaves } from './kept-leaves'
import { NamesToConfirm } from './names-to-confirm'
import { Trouble } from './trouble'
import type { SortingDesk } from './use-sorting-desk'
import { WhatIsKnown } from './what-is-known'
import { WhereItBelongs } from './where-it-belongs'
import { WithoutScript } from './without-script'
import style from './sorting.module.css'

/** The right of the table: what is known of the sheet in hand and where it may belong, the names still open, and everything that is sorted. */
export function WhatToDo({ desk }: { desk: SortingDesk }) {
  const { table, busy, leaf, page, looked, names, named, perform, send } = desk
  const atNames = !leaf && !looked
  const ask = (script: SortScript) => send({ type: 'ask', for: { nameOf: script.id } })
  const bringBack = ({ id }: { id: string }) => perform({ act: 'lay', leafId: id, to: 'loose' })
  const trouble = <WhatIsWrong desk={desk} />
  return (
    <div className={style.sayings} tabIndex={-1}>
      {leaf && !looked && (
        <>
          <WhatIsKnown leaf={leaf} table={table} page={page} onPage={(to) => send({ type: 'page', leafId: leaf.id, page: to })} />
          <WhereItBelongs leaf={leaf} table={table} page={page} busy={busy} trouble={trouble} onPlace={desk.placeNth} onOther={() => send({ type: 'ask', for: 'place' })} onExtra={() => send({ type: 'ask', for: 'extra' })} onAside={desk.aside} onLater={desk.later} />
        </>
      )}
      {(!leaf || looked) && trouble}
      <NamesToConfirm table={table} unsure={names.unsure} inHand={named?.id ?? null} lead={atNames} busy={busy} onYes={desk.yes} onOther={ask} onLook={desk.look} />
      <CertainNames table={table} certain={names.certain} lead={atNames && names.unsure.length === 0} busy={busy} onAll={desk.allCertain} onOther={ask} onLook={desk.look} />
      <WithoutScript table={table} busy={busy} onAttendance={({ classSetId, studentId }, attendance) => perform({ act: 'attendance', classSetId, studentId, attendance })} />
      <AllScripts table={table} busy={busy} onLook={desk.look} onOther={ask} onUnname={({ id }) => perform({ act: 'unname', scriptId: id })} />
      <KeptLeaves title="Set aside" says="kept, not part of this test" leaves={table.setAside} busy={busy} onBack={bringBack} />
      <KeptLeaves title="Empty backs" says="kept, not shown while marking" leaves={table.blank} busy={busy} onBack={bringBack} />
    </div>
  )
}

/** What was refused, and what can be done instead. */
function WhatIsWrong({ desk: { refused, unpaged, busy, perform, forgive, send } }: { desk: SortingDesk }) {
  if (unpaged) return <p role="alert" className="alarm dense mt-2">Which page of the paper is it? Choose it above first, or make it an extra page.</p>
  return refused && <Trouble error={refused.error} act={refused.act} busy={busy} onAct={perform} onClose={forgive} onCorners={() => send({ type: 'ask', for: 'corners' })} />
}
