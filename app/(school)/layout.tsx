import { redirect } from 'next/navigation'
import type { ReactNode } from 'react'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { LiveData } from '@/components/ui/live-data'
import { DemoBanner } from '@/components/ui/demo-banner'
import { maySchool } from '@/lib/core/actor'
import { env } from '@/lib/infra/env'

/** Staff only: a student has a page of their own. Each page and task asks again for its own object. */
export default async function SchoolLayout({ children }: { children: ReactNode }) {
  const actor = await actorOrSignIn()
  if (!maySchool(actor, 'staff')) redirect('/my-scripts')
  return <LiveData>{env.demo && <DemoBanner />}{children}</LiveData>
}
