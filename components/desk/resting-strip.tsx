import { memo } from 'react'
import { RingedMark } from '@/components/ui/ringed-mark'
import { StampsOnSvg } from '@/components/paper/stamps-on-svg'
import { markOf } from '@/lib/core/marking'
import type { Strip } from '@/lib/core/run'
import { penOf } from '@/lib/core/stamp'
import { stampsOf, type DeskState } from './desk-state'
import { sayStanding, sayStamps } from './say-desk'
import { SpacePicture, widthOfSpace } from './space-picture'
import type { Sizes } from './use-sizes'
import styles from './desk.module.css'

type RestingStripProps = Readonly<{ strip: Strip; index: number; run: DeskState['run']; sizes: Sizes; below: boolean; onTake: (index: number) => void }>

/** How far a resting strip slides under its neighbour, in points: never more than the printed question, and nothing of a low space. */
function tuck(strip: Strip): number {
  const [first] = strip.pictures
  return first && first.rect.h > 60 ? Math.min(20, first.rect.h * 0.22) : 0
}

/** A neighbour: there to be compared with, taken in hand by a press. */
export const RestingStrip = memo(function RestingStrip({ strip, index, run, sizes, below, onTake }: RestingStripProps) {
  const pen = penOf(run.round)
  const standing = sayStanding(strip)
  const settled = strip.marking?.state === 'settled'
  const [first] = strip.pictures
  const scale = first ? widthOfSpace(first, strip, sizes) / first.rect.w : 1
  return (
    <li className={`${styles.strip} ${styles.rest} ${below ? styles.below : ''}`} style={{ marginTop: -Math.round(tuck(strip) * scale), zIndex: 500 - index }}>
      <div className={styles.who}>
        <button type="button" className={styles.take} onClick={(event) => { event.currentTarget.blur(); onTake(index) }} aria-label={`Take script ${strip.number} in hand`}>{strip.name ?? strip.number}</button>
      </div>
      <div className={styles.sheets} onClick={() => onTake(index)}>
        {strip.pictures.map((picture) => (
          <SpacePicture key={picture.spaceId} picture={picture} width={widthOfSpace(picture, strip, sizes)} density={sizes.density} alt={`Handwritten answer, script ${strip.number}. ${sayStamps(strip, run)}`}>
            <StampsOnSvg stamps={stampsOf(strip).filter((stamp) => stamp.scriptPageId === picture.scriptPageId)} rect={picture.rect} pen={pen} />
          </SpacePicture>
        ))}
      </div>
      <div className={styles.mark}>
        {settled && standing !== 'nothing written' && <RingedMark mark={markOf(strip.marking!.stamps)} pen={pen} />}
        {standing && <span>{standing}</span>}
        {strip.flag && <span>flag</span>}
      </div>
    </li>
  )
})
