import { StampedPicture, sayStamps } from '@/components/paper/stamped-picture'
import { RingedMark } from '@/components/ui/ringed-mark'
import type { ComparedMarking, Comparison } from '@/lib/core/second-marking'
import styles from './second-marking.module.css'

type ComparedSideProps = Readonly<{ title: string; says: string; marking: ComparedMarking; pictures: Comparison['pictures']; pen: 'first' | 'second' }>

/** One pen over the answer, its ringed mark, and its stamps in words. */
export function ComparedSide({ title, says, marking, pictures, pen }: ComparedSideProps) {
  return (
    <section className={styles.side}>
      <h2>{title} <small className="small">{marking.marker}, {says}</small><RingedMark mark={marking.mark} pen={pen} width={50} /></h2>
      <StampedPicture pictures={pictures} stamps={marking.stamps} pen={pen} name={title} />
      <p className={styles.why}>{sayStamps(marking.stamps)}</p>
    </section>
  )
}
