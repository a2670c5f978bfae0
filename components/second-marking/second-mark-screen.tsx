import type { Outcome } from '@/lib/core/outcome'
import type { SecondMarking } from '@/lib/core/second-marking'
import { DrawForm } from './draw-form'
import { SampleSection } from './sample-section'

type Act = (raw: unknown) => Promise<Outcome<unknown>>
type SecondMarkScreenProps = Readonly<{ marking: SecondMarking; acts: Readonly<{ draw: Act; addScript: Act; close: Act; undo: Act }> }>

/** Second marking of a paper: an owner draws, follows and decides; a moderator finds the questions to second-mark. */
export function SecondMarkScreen({ marking, acts }: SecondMarkScreenProps) {
  const { paperId, owner, offers, samples } = marking
  const open = offers.filter(({ classSetId, moderators }) => moderators.length > 0 || !samples.some((sample) => sample.classSetId === classSetId))
  return (
    <main className="page">
      <h1>Second-mark</h1>
      {samples.map((sample) => <SampleSection key={sample.id} paperId={paperId} sample={sample} owner={owner} acts={acts} />)}
      {open.map((offer) => <DrawForm key={`${offer.classSetId} ${offer.moderators.length}`} offer={offer} another={samples.some(({ classSetId }) => classSetId === offer.classSetId)} draw={acts.draw} />)}
      {samples.length === 0 && open.length === 0 && <p className="slip mt-4">Nothing has been scanned for this paper yet, so there is nothing to second-mark.</p>}
    </main>
  )
}
