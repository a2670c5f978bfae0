'use client'
import { useState, type CSSProperties } from 'react'

type NoteEditorProps = Readonly<{ label: string; text: string; style: CSSProperties; onDone: (text: string) => void; onCancel: () => void }>

/** A note written where it will stand. Enter puts it there, Shift and Enter begins a line, Esc leaves it. */
export function NoteEditor({ label, text, style, onDone, onCancel }: NoteEditorProps) {
  const [draft, setDraft] = useState(text)
  return (
    <div className="absolute z-10" style={style}>
      <textarea
        autoFocus aria-label={label} aria-describedby="note-caution" value={draft} rows={2} maxLength={600}
        className="block w-64 rounded-[2px] border-2 border-ink bg-paper p-1 font-book text-[length:var(--t-2)] italic text-ink"
        onChange={(event) => setDraft(event.target.value)} onBlur={() => onDone(draft)}
        onKeyDown={(event) => {
          event.stopPropagation()
          if (event.key === 'Escape') onCancel()
          if (event.key !== 'Enter' || event.shiftKey) return
          event.preventDefault()
          onDone(draft)
        }}
      />
      <small id="note-caution" className="block w-64 bg-paper px-1 text-ink-2">Students can ask to see comments. ↵ puts it there, Esc leaves it.</small>
    </div>
  )
}
