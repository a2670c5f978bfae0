import { useId, type InputHTMLAttributes, type ReactNode, type SelectHTMLAttributes } from 'react'

type Around = Readonly<{ label: string; say?: ReactNode; bad?: string | null; className?: string }>

function Frame({ id, label, say, bad, className = '', children }: Around & { id: string; children: ReactNode }) {
  return (
    <div className={`field ${bad ? 'bad' : ''} ${className}`}>
      <label htmlFor={id}>{label}</label>
      {children}
      {(bad || say) && <span className="say" id={`${id}-say`}>{bad ? `! ${bad}` : say}</span>}
    </div>
  )
}

/** A labelled line to write on. `say` is a hint beneath it; `bad` says what is wrong and what to write. */
export function Field({ label, say, bad, className, ...input }: Around & InputHTMLAttributes<HTMLInputElement>) {
  const id = useId()
  return (
    <Frame {...{ id, label, say, bad, className }}>
      <input id={id} aria-invalid={bad ? true : undefined} aria-describedby={bad || say ? `${id}-say` : undefined} {...input} />
    </Frame>
  )
}

export function SelectField({ label, say, bad, className, children, ...input }: Around & SelectHTMLAttributes<HTMLSelectElement>) {
  const id = useId()
  return (
    <Frame {...{ id, label, say, bad, className }}>
      <select id={id} aria-describedby={bad || say ? `${id}-say` : undefined} {...input}>{children}</select>
    </Frame>
  )
}
