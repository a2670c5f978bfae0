'use client'
import { useQuery, useQueryClient } from '@tanstack/react-query'
import Link from 'next/link'
import { useRouter } from 'next/navigation'
import { useEffect, useRef, useState, type DragEvent } from 'react'
import { ask } from '@/components/ui/ask'
import type { ScanPageData } from '@/lib/core/sheaf-progress'
import { ChooseClasses } from './choose-classes'
import { DropPlace } from './drop-place'
import { oneFile } from './one-file'
import { SheafSection } from './sheaf-section'
import { counted } from './sheaf-words'
import { useUpload } from './use-upload'
import style from './scan.module.css'

const lookAgainMs = 1000

/** One place to drop the copier's file, and a line a leaf as it is read. */
export function ScanBoard({ paperId, start }: { paperId: string; start: ScanPageData }) {
  const key = ['sheaves', paperId]
  const client = useQueryClient()
  const again = () => void client.invalidateQueries({ queryKey: key })
  const { data } = useQuery({
    queryKey: key, queryFn: () => ask<ScanPageData>(`/api/papers/${paperId}/sheaves`), initialData: start,
    refetchInterval: ({ state }) => (state.data?.sheaves.some((sheaf) => sheaf.state === 'waiting' || sheaf.state === 'reading') ? lookAgainMs : false),
  })
  // The stage line above is the server's: it is asked again when a sheaf comes or ends.
  const router = useRouter()
  const states = data.sheaves.map(({ id, state }) => `${id} ${state}`).join()
  const shown = useRef(states)
  useEffect(() => {
    if (shown.current === states) return
    shown.current = states
    router.refresh()
  }, [states, router])
  const upload = useUpload(paperId, data.limitMb, again)
  const [asking, setAsking] = useState<File | null>(null)
  const [over, setOver] = useState(false)
  const ready = data.hasBlankPaper && data.classSets.length > 0
  const busy = upload.state.step !== 'none' && upload.state.step !== 'refused'

  const take = async (files: readonly File[]) => {
    if (files.length === 0 || !ready || busy) return
    const file = await oneFile(files)
    if (!file) upload.refuse(files[0]!.name, 'files_mixed')
    else if (data.classSets.length > 1) setAsking(file)
    else upload.send(file, [])
  }
  const dropping = {
    onDragOver: (event: DragEvent) => { event.preventDefault(); setOver(true) },
    onDragLeave: (event: DragEvent) => { if (event.currentTarget === event.target) setOver(false) },
    onDrop: (event: DragEvent) => { event.preventDefault(); setOver(false); void take([...event.dataTransfer.files]) },
  }
  const place = (lead: boolean, label: string) => <DropPlace upload={upload.state} lead={lead} label={label} brokenOff={upload.brokenOff} onFiles={(files) => void take(files)} onGoOn={upload.goOn} onStop={upload.stop} />
  const readAgain = (sheafId: string) => void ask(`/api/sheaves/${sheafId}/again`, { method: 'POST' }).finally(again)

  return (
    <main className={over ? style.over : undefined} {...dropping}>
      {asking && <ChooseClasses file={asking.name} classSets={data.classSets} onClose={() => setAsking(null)} onChosen={(ids) => { upload.send(asking, ids); setAsking(null) }} />}
      {data.sheaves.length === 0 ? <Empty paperId={paperId} data={data} ready={ready}>{place(true, 'Choose the sheaf')}</Empty> : (
        <div className={style.body}>
          {data.sheaves.toReversed().map((sheaf, k) => <SheafSection key={sheaf.id} sheaf={sheaf} paperId={paperId} first={k === 0} onAgain={() => readAgain(sheaf.id)} onStopped={again} />)}
          <section className={style.next} aria-label="Another sheaf">{place(false, 'Choose another sheaf')}</section>
        </div>
      )}
    </main>
  )
}

function Empty({ paperId, data, ready, children }: { paperId: string; data: ScanPageData; ready: boolean; children: React.ReactNode }) {
  const students = data.classSets.reduce((sum, one) => sum + one.students, 0)
  return (
    <div className={style.ruled}>
      <section aria-label="The first sheaf">
        <h1 className="mb-2">Nothing scanned yet</h1>
        {ready ? (
          <>
            <p className="mb-4 text-[length:var(--t-3)] leading-7">Put the pile through the copier as one PDF and drop it here. The paper is set: {counted(data.questions, 'question')}, {counted(students, 'student')} on the list.</p>
            {children}
            <p className="soft mt-4 text-[length:var(--t-3)] leading-7">Any order, either way up, empty backs included. A sheet that cannot be placed for sure is kept for you to place.</p>
            {data.demoPile && <p className="mt-4 border-t border-[var(--rule)] pt-4">No copier at hand? <a href={`/api/papers/${paperId}/demo-pile`} download>Download a scanned pile of this paper</a> and drop it here.</p>}
          </>
        ) : (
          <>
            <p className="mb-4 text-[length:var(--t-3)] leading-7">{data.hasBlankPaper ? 'No class sits this paper yet. Say which, and the sheets can be told apart by their names.' : 'Sheets are recognised by the blank paper. Add its PDF first.'}</p>
            <Link className="btn lead" href={`/papers/${paperId}/set`}>{data.hasBlankPaper ? 'Add a class' : 'Set the paper'}</Link>
          </>
        )}
      </section>
    </div>
  )
}
