import type { Metadata } from 'next'
import { redirect } from 'next/navigation'
import { currentActor } from '@/app/_door/require-actor'
import { SignInForm } from '@/components/door/sign-in-form'
import { env } from '@/lib/infra/env'
import { schoolIsEmpty } from '@/lib/tasks/school-is-empty'

export const metadata: Metadata = { title: 'Sign in' }

export default async function SignInPage() {
  if (await currentActor()) redirect('/')
  if (await schoolIsEmpty()) redirect('/first-admin')
  return <SignInForm school={env.schoolName} demo={env.demo} />
}
