import type { Metadata } from 'next'
import { notFound, redirect } from 'next/navigation'
import { pageOf } from '@/app/_door/page-of'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { CompareScreen } from '@/components/second-marking/compare-screen'
import { AppError } from '@/lib/core/errors'
import { compareMarkings } from '@/lib/tasks/compare-markings'
import { beginAgreed, decide } from '../actions'

export const metadata: Metadata = { title: 'First and second mark' }

type Props = { params: Promise<{ paperId: string; responseId: string }> }

export default async function ComparePage({ params }: Props) {
  const { paperId, responseId } = await params
  const actor = await actorOrSignIn()
  const comparison = await pageOf(compareMarkings(actor, responseId).catch((error: unknown) => {
    // Not settled, or opened again: there is nothing to compare, so the list says how far it is.
    if (error instanceof AppError && error.code === 'marking_unsettled') redirect(`/papers/${paperId}/second-mark`)
    throw error
  }))
  if (comparison.paperId !== paperId) notFound()
  return <CompareScreen key={responseId} comparison={comparison} acts={{ decide, beginAgreed }} end={<PersonEnd />} />
}
