import type { Metadata } from 'next'
import { redirect } from 'next/navigation'
import { AskLinkForm } from '@/components/door/ask-link-form'
import { env } from '@/lib/infra/env'
import { schoolIsEmpty } from '@/lib/tasks/school-is-empty'
import { askForLink } from './actions'

export const metadata: Metadata = { title: 'New password' }

export default async function NewPasswordPage() {
  if (await schoolIsEmpty()) redirect('/first-admin')
  return <AskLinkForm school={env.schoolName} ask={askForLink} />
}
