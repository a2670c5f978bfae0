'use client'
import { Autocomplete, Input, ListBox, ListBoxItem, SearchField, useFilter } from 'react-aria-components'
import { Dialog } from '@/components/ui/dialog'
import type { PlaceTarget, SortingTable } from '@/lib/core/sorting'
import style from './sorting.module.css'

export type Choice = Readonly<{ id: string; text: string; number: string; stands: string; target: PlaceTarget; student: { classSetId: string; studentId: string } | null }>

/** Every student of the lists with how their script stands, and scripts nobody is suggested for. */
export function choicesOf(table: SortingTable, named: boolean): Choice[] {
  const several = table.classes.length > 1
  const students = table.students.map((one): Choice => {
    const script = table.scripts.find(({ id, suggestedStudentId, classSetId }) => id === one.scriptId || (suggestedStudentId === one.studentId && classSetId === one.classSetId))
    const stands = one.scriptId ? `script ${script?.number ?? ''}` : script ? `perhaps script ${script.number}` : one.attendance === 'expected' ? 'no script yet' : one.attendance
    const { classSetId, studentId } = one
    return {
      id: `${classSetId}/${studentId}`, text: `${one.familyName}, ${one.givenName}`, number: several ? `${one.candidateNumber}, ${one.className}` : one.candidateNumber, stands,
      target: script ? { scriptId: script.id } : { classSetId, studentId }, student: { classSetId, studentId },
    }
  }).toSorted((a, b) => a.text.localeCompare(b.text))
  if (named) return students
  const nobody = table.scripts.filter(({ studentId, suggestedStudentId }) => !studentId && !suggestedStudentId)
  return [...students, ...nobody.map(({ id, number }): Choice => ({ id, text: `Script ${number}`, number: '', stands: 'no name yet', target: { scriptId: id }, student: null }))]
}

type ChooseStudentProps = Readonly<{ title: string; choices: readonly Choice[]; onChosen: (choice: Choice) => void; onClose: () => void }>

/** Type a few letters of a name or number, Enter takes the one marked. */
export function ChooseStudent({ title, choices, onChosen, onClose }: ChooseStudentProps) {
  const { contains } = useFilter({ sensitivity: 'base' })
  return (
    <Dialog title={title} open onClose={onClose}>
      <div className={style.choose}>
        <Autocomplete filter={contains}>
          <SearchField aria-label="Name or candidate number" autoFocus><Input placeholder="Name or number" /></SearchField>
          <ListBox className={style.options} aria-label="Students" items={choices} selectionMode="none" onAction={(key) => { const choice = choices.find(({ id }) => id === key); if (choice) onChosen(choice) }} renderEmptyState={() => <p className="p-2 soft">Nobody of that name or number</p>}>
            {(choice) => <ListBoxItem id={choice.id} textValue={`${choice.text} ${choice.number}`} className={style.option}><span>{choice.text}</span> <span className="soft">{choice.number}</span><span>{choice.stands}</span></ListBoxItem>}
          </ListBox>
        </Autocomplete>
      </div>
      <div className="mt-4"><button type="button" className="btn plain" onClick={onClose}>Back</button></div>
    </Dialog>
  )
}
