'use client'
import { useState } from 'react'
import { Dialog } from '@/components/ui/dialog'
import type { SittingClassChoice } from '@/lib/core/sheaf-progress'

type ChooseClassesProps = Readonly<{ file: string; classSets: readonly SittingClassChoice[]; onChosen: (ids: readonly string[]) => void; onClose: () => void }>

/** Asks whose scripts lie in a sheaf, when more than one class sits the paper. */
export function ChooseClasses({ file, classSets, onChosen, onClose }: ChooseClassesProps) {
  const [chosen, setChosen] = useState<readonly string[]>([])
  const toggle = (id: string) => setChosen((before) => (before.includes(id) ? before.filter((one) => one !== id) : [...before, id]))
  return (
    <Dialog title="Whose scripts lie in it?" open onClose={onClose}>
      <p className="mt-1 soft">{file}. Choose every class whose scripts went through the copier with it.</p>
      <fieldset className="mt-3 grid gap-2">
        <legend className="vh">Classes</legend>
        {classSets.map(({ classSetId, className, satOn, students }) => (
          <label key={classSetId} className="chk"><input type="checkbox" checked={chosen.includes(classSetId)} onChange={() => toggle(classSetId)} /> <span><b className="font-semibold">{className}</b> <span className="soft">{satOn}, {students} students</span></span></label>
        ))}
      </fieldset>
      <div className="mt-4 flex gap-3">
        <button type="button" className="btn lead" disabled={chosen.length === 0} onClick={() => onChosen(chosen)}>Send it</button>
        <button type="button" className="btn plain" onClick={onClose}>Not now</button>
      </div>
    </Dialog>
  )
}
