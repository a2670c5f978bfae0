'use client'
import { useRef } from 'react'
import { Alarm } from '@/components/ui/alarm'
import type { UploadState } from './sheaf-upload'
import style from './scan.module.css'

type DropPlaceProps = Readonly<{ upload: UploadState; lead: boolean; label: string; brokenOff: readonly string[]; onFiles: (files: readonly File[]) => void; onGoOn: () => void; onStop: () => void }>

/** The button that chooses a sheaf, and how far it has come on its way. The whole page takes a dropped file. */
export function DropPlace({ upload, lead, label, brokenOff, onFiles, onGoOn, onStop }: DropPlaceProps) {
  const input = useRef<HTMLInputElement>(null)
  if (upload.step === 'sending' || upload.step === 'waiting' || upload.step === 'checking') return <Sending upload={upload} onGoOn={onGoOn} onStop={onStop} />
  return (
    <div>
      {upload.step === 'refused' && <div className="mb-3"><p className="font-medium">{upload.name}</p><Alarm code={upload.code} detail={upload.detail} /></div>}
      {upload.step === 'none' && brokenOff.length > 0 && <p className="mb-3">{brokenOff[0]} did not arrive whole. Choose the same file again: it goes on where it stopped.</p>}
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
        <button type="button" className={`btn ${lead ? 'lead' : ''}`} onClick={() => input.current?.click()}>{label}</button>
        <span className="soft">or drop the PDF, or pictures (JPEG, PNG, TIFF), anywhere on this page</span>
      </div>
      <input ref={input} type="file" multiple accept="application/pdf,image/jpeg,image/png,image/tiff,.pdf,.jpg,.jpeg,.png,.tif,.tiff" className="vh" tabIndex={-1} aria-label="The sheaf, as a PDF or pictures"
        onChange={(event) => { const files = [...(event.target.files ?? [])]; event.target.value = ''; onFiles(files) }} />
    </div>
  )
}

type SendingProps = Readonly<{ upload: Extract<UploadState, { step: 'sending' | 'waiting' | 'checking' }>; onGoOn: () => void; onStop: () => void }>

function Sending({ upload, onGoOn, onStop }: SendingProps) {
  const sent = upload.step === 'checking' ? 1 : upload.sent
  const percent = Math.floor(sent * 100)
  return (
    <div>
      <p className="font-medium">{upload.name}</p>
      <div className={style.sent} role="progressbar" aria-label="Sent" aria-valuenow={percent} aria-valuemin={0} aria-valuemax={100}><i style={{ width: `${sent * 100}%` }} /></div>
      <p className={style.count} role="status">
        {upload.step === 'checking' ? <span>All there. Looking at the file</span> : <span>{percent} % sent</span>}
      </p>
      {upload.step === 'waiting' && <p className="alarm">The line is down. What has arrived is kept; it goes on by itself when the line is back.</p>}
      {upload.step !== 'checking' && (
        <div className={style.row}>
          {upload.step === 'waiting' && <button type="button" className="btn" onClick={onGoOn}>Try now</button>}
          <button type="button" className="btn plain" onClick={onStop}>Do not send it</button>
        </div>
      )}
    </div>
  )
}
