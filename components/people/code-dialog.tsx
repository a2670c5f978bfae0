'use client'
import { Dialog } from '@/components/ui/dialog'

/** A one-time code to hand over: shown here once, then nowhere. */
export function CodeDialog({ name, code, onClose }: { name: string; code: string; onClose: () => void }) {
  return (
    <Dialog title={`A code for ${name}`} open onClose={onClose}>
      <p className="my-3 text-[length:var(--t-4)] leading-7 tracking-wider select-all">{code}</p>
      <p>Write it down now: it is not shown again. On the sign-in page, “No password yet” takes it; it works once, for 28 days.</p>
      <div className="mt-4"><button className="btn lead" onClick={onClose}>It is written down</button></div>
    </Dialog>
  )
}
