import { Alarm } from '@/components/ui/alarm'
import type { RefusedError } from '@/components/ui/ask'
import type { SortingAct } from '@/lib/core/sorting-act'

type TroubleProps = Readonly<{ error: RefusedError; act: SortingAct; busy: boolean; onAct: (act: SortingAct) => void; onCorners: () => void; onClose: () => void }>

/** What was refused, in words, and what can be done instead. */
export function Trouble({ error, act, busy, onAct, onCorners, onClose }: TroubleProps) {
  return (
    <div className="mt-3">
      <Alarm code={error.code} detail={error.detail} />
      <div className="mt-2 flex flex-wrap gap-3">
        {error.code === 'place_taken' && act.act === 'place' && (
          <>
            <button type="button" className="btn" disabled={busy} onClick={() => onAct({ ...act, instead: true })}>Use this one instead</button>
            <button type="button" className="btn" disabled={busy} onClick={() => onAct({ act: 'extra', leafId: act.leafId, target: act.target })}>Make it an extra page</button>
          </>
        )}
        {error.code === 'no_registration' && <button type="button" className="btn" onClick={onCorners}>Show the corners</button>}
        <button type="button" className="btn plain" onClick={onClose}>Leave it</button>
      </div>
      {error.code === 'place_taken' && <p className="soft dense mt-1">The page that lies there is kept, and so is what was marked on it.</p>}
    </div>
  )
}
