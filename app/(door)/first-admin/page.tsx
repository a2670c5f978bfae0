import type { Metadata } from 'next'
import { notFound } from 'next/navigation'
import { FirstAdmin } from '@/components/door/first-admin'
import { env } from '@/lib/infra/env'
import { schoolIsEmpty } from '@/lib/tasks/school-is-empty'
import { beFirstAdmin } from './actions'

export const metadata: Metadata = { title: 'The first admin' }

export default async function FirstAdminPage() {
  if (!(await schoolIsEmpty())) notFound()
  return <FirstAdmin school={env.schoolName} begin={beFirstAdmin} />
}
