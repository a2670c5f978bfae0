import { sayDay } from '@/lib/core/say-day'

type ClassSetChoiceProps = Readonly<{ classSets: readonly { id: string; className: string; satOn: string }[]; value: string | null; onChange: (id: string) => void }>

/** Which class this is about, where several sat the paper. */
export function ClassSetChoice({ classSets, value, onChange }: ClassSetChoiceProps) {
  return (
    <div className="tabs" role="group" aria-label="Class">
      {classSets.map(({ id, className, satOn }) => (
        <button key={id} type="button" aria-current={id === value ? 'true' : undefined} onClick={() => onChange(id)}>{className} <span className="dense soft">{sayDay(satOn)}</span></button>
      ))}
    </div>
  )
}
