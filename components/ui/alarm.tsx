import { TriangleAlert } from 'lucide-react'
import type { ErrorCode, ErrorDetail, ErrorLine } from '@/lib/core/errors'
import { errorSentence } from './error-sentence'

type AlarmProps = Readonly<{ code: ErrorCode | 'failed'; detail?: ErrorDetail }>

/** Expected trouble in words, with the faulty lines when there are some. */
export function Alarm({ code, detail = {} }: AlarmProps) {
  const lines = Array.isArray(detail.lines) ? (detail.lines as readonly ErrorLine[]) : []
  return (
    <div role="alert" className="alarm">
      <p className="line bad"><TriangleAlert className="ic" aria-hidden /> <span>{errorSentence(code, detail)}</span></p>
      {lines.length > 0 && (
        <ul className="dense mt-1 ml-6 list-disc">
          {lines.map((line, k) => <li key={k}><b className="font-medium">{line.path}</b> {line.says}</li>)}
        </ul>
      )}
    </div>
  )
}
