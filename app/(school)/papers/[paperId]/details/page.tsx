import type { Metadata } from 'next'
import Link from 'next/link'
import type { ReactNode } from 'react'
import { pageOf } from '@/app/_door/page-of'
import { PaperPage } from '@/app/_door/paper-page'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { ClassSets } from '@/components/paper-details/class-sets'
import { DetailsForm } from '@/components/paper-details/details-form'
import { PaperFiles } from '@/components/paper-details/paper-files'
import { PaperPeople } from '@/components/paper-details/paper-people'
import { now } from '@/lib/infra/clock'
import { readPaperDetails } from '@/lib/tasks/read-paper-details'
import { addSet, assign, removeSet, renewSet, saveDetails, setAttendance, share, stopSharing } from './actions'

export const metadata: Metadata = { title: 'Details' }

export default async function DetailsPage({ params }: { params: Promise<{ paperId: string }> }) {
  const { paperId } = await params
  const view = await pageOf(readPaperDetails(await actorOrSignIn(), paperId))
  return (
    <PaperPage paperId={paperId} now="Set">
      <main className="page">
        <div className="flex items-baseline gap-4"><h1>About this paper</h1><Link className="ml-auto" href={`/papers/${paperId}/print`}>Print with codes</Link><Link href={`/papers/${paperId}/set`}>Answer spaces and scheme</Link></div>
        <Part title="The paper"><DetailsForm key={JSON.stringify(view.details)} paperId={paperId} details={view.details} save={saveDetails} /></Part>
        <Part title="Classes"><ClassSets view={view} acts={{ addSet, removeSet, renewSet, setAttendance }} today={new Date(now()).toISOString().slice(0, 10)} /></Part>
        <Part title="People"><PaperPeople view={view} acts={{ share, stopSharing, assign }} /></Part>
        <Part title="Files"><PaperFiles view={view} /></Part>
      </main>
    </PaperPage>
  )
}

function Part({ title, children }: { title: string; children: ReactNode }) {
  return <section className="mt-8"><h2 className="cap mb-4">{title}</h2>{children}</section>
}
