import { redirect } from 'next/navigation'
import type { ReactNode } from 'react'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { DemoBanner } from '@/components/ui/demo-banner'
import { maySchool } from '@/lib/core/actor'
import { env } from '@/lib/infra/env'

/** Students only: staff have the mark book. Each page and task asks again for its own object. */
export default async function StudentLayout({ children }: { children: ReactNode }) {
  const actor = await actorOrSignIn()
  if (maySchool(actor, 'staff')) redirect('/')
  return <>{env.demo && <DemoBanner />}{children}</>
}
