import type { ReactNode } from 'react'
import { KeyCap } from '@/components/ui/key-cap'
import type { LikelyPlace, LooseLeaf, SortingTable } from '@/lib/core/sorting'
import { fullName, whose, whyThere } from './sorting-words'
import style from './sorting.module.css'

type WhereItBelongsProps = Readonly<{
  leaf: LooseLeaf
  table: SortingTable
  page: number | null
  busy: boolean
  /** Takes the place of that rank, from 0. */
  onPlace: (rank: number) => void
  onOther: () => void
  onExtra: () => void
  onAside: () => void
  onLater: () => void
  /** What was refused, and what can be done instead. */
  trouble: ReactNode
}>

/** The two or three likeliest places, one key each, and what else can be done with the sheet. */
export function WhereItBelongs({ leaf, table, page, busy, onPlace, onOther, onExtra, onAside, onLater, trouble }: WhereItBelongsProps) {
  return (
    <section aria-label="Where it may belong">
      <h2>Where it may belong {leaf.places.length > 0 && <small>the hand on a page of each</small>}</h2>
      {leaf.places.map((place, k) => <Place key={k} index={k + 1} {...{ place, table, page, busy }} onPress={() => onPlace(k)} />)}
      {leaf.places.length === 0 && <p className="soft dense py-2">No place is likelier than another. Choose the student, or say that it is an extra page or not part of this test.</p>}
      <div className={style.else}>
        <Act press="/" busy={busy} onPress={onOther}>another student</Act>
        <Act press="E" busy={busy} onPress={onExtra}>extra page</Act>
        <Act press="D" busy={busy} onPress={onAside}>not part of this test</Act>
        <Act press="L" busy={busy} onPress={onLater}>leave for later</Act>
      </div>
      {trouble}
    </section>
  )
}

function Act({ press, busy, onPress, children }: { press: string; busy: boolean; onPress: () => void; children: string }) {
  return <button type="button" className={style.act} disabled={busy} onClick={onPress}><KeyCap>{press}</KeyCap> {children}</button>
}

type PlaceProps = Readonly<{ index: number; place: LikelyPlace; table: SortingTable; page: number | null; busy: boolean; onPress: () => void }>

function Place({ index, place, table, page, busy, onPress }: PlaceProps) {
  const { target } = place
  const script = 'scriptId' in target ? table.scripts.find(({ id }) => id === target.scriptId) : undefined
  const student = 'studentId' in target ? table.students.find(({ studentId, classSetId }) => studentId === target.studentId && classSetId === target.classSetId) : undefined
  const known = student ? { name: fullName(student), number: student.candidateNumber, sure: true } : whose(script, table)
  const leafId = script?.pages.find((one) => one.leafId !== null && one.paperPage !== null)?.leafId
  return (
    <button type="button" className={style.place} disabled={busy} onClick={onPress}>
      <KeyCap>{String(index)}</KeyCap>
      <span>
        <b>{known.name}</b> {known.number}{known.sure || !known.number ? '' : <span className="soft"> perhaps, script {script?.number}</span>}
        <span className={style.why}>{whyThere(place, page, script, student)}</span>
      </span>
      <span className={style.hand}>{leafId ? <img src={`/api/leaves/${leafId}/crop?box=hand`} alt="writing on a page of this script" loading="lazy" /> : 'no page yet'}</span>
    </button>
  )
}
