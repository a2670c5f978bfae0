import type { Metadata } from 'next'
import { ChoosePasswordForm } from '@/components/door/choose-password-form'
import { LinkOver } from '@/components/door/link-over'
import { AppError } from '@/lib/core/errors'
import { env } from '@/lib/infra/env'
import { readLink } from '@/lib/tasks/read-link'
import { choosePassword } from '../actions'

export const metadata: Metadata = { title: 'Choose a password', referrer: 'no-referrer', robots: 'noindex' }

export default async function ChoosePasswordPage({ params }: { params: Promise<{ token: string }> }) {
  const token = decodeURIComponent((await params).token)
  const link = await readLink(token).catch((error: unknown) => {
    if (error instanceof AppError) return null
    throw error
  })
  if (!link) return <LinkOver school={env.schoolName} />
  return <ChoosePasswordForm school={env.schoolName} token={token} {...link} choose={choosePassword} />
}
