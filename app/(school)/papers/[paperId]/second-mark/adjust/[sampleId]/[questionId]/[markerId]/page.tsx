import type { Metadata } from 'next'
import { notFound, redirect } from 'next/navigation'
import { PaperPage } from '@/app/_door/paper-page'
import { pageOf } from '@/app/_door/page-of'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { AdjustScreen } from '@/components/second-marking/adjust-screen'
import { AppError } from '@/lib/core/errors'
import { readAdjustment } from '@/lib/tasks/read-adjustment'
import { adjust } from '../../../../actions'

export const metadata: Metadata = { title: 'One adjustment' }

type Props = { params: Promise<{ paperId: string; sampleId: string; questionId: string; markerId: string }> }

export default async function AdjustPage({ params }: Props) {
  const { paperId, ...asked } = await params
  const actor = await actorOrSignIn()
  const plan = await pageOf(readAdjustment(actor, asked).catch((error: unknown) => {
    // Nothing to adjust, or no more: the list says how the marks stand.
    if (error instanceof AppError && (error.code === 'no_pattern' || error.code === 'sample_closed')) redirect(`/papers/${paperId}/second-mark`)
    throw error
  }))
  if (plan.paperId !== paperId) notFound()
  return <PaperPage paperId={paperId} now="Second-mark"><AdjustScreen plan={plan} decider={`${actor.givenName} ${actor.familyName}`} adjust={adjust} /></PaperPage>
}
