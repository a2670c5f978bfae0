import type { Metadata } from 'next'
import { PersonEnd } from '@/app/_door/person-end'
import { actorOrSignIn } from '@/app/_door/require-actor'
import { OwnPasswordForm } from '@/components/account/own-password-form'
import { SignOutButton } from '@/components/account/sign-out-button'
import { ThemeChoice } from '@/components/account/theme-choice'
import { DemoBanner } from '@/components/ui/demo-banner'
import { TopBar } from '@/components/ui/top-bar'
import { maySchool } from '@/lib/core/actor'
import { env } from '@/lib/infra/env'
import { changePassword } from './actions'

export const metadata: Metadata = { title: 'Your account' }

/** Every role has this page: staff and students alike. */
export default async function AccountPage() {
  const actor = await actorOrSignIn()
  const home = maySchool(actor, 'staff') ? '/' : '/my-scripts'
  return (
    <>
      {env.demo && <DemoBanner />}
      <TopBar home={home} where={[{ label: env.schoolName, href: home }, { label: 'Your account' }]}><PersonEnd /></TopBar>
      <main className="page">
        <h1>{actor.givenName} {actor.familyName}</h1>
        <p className="soft">{actor.roles.join(', ')}</p>
        <div className="mt-6 grid max-w-[44rem] grid-cols-[6.5rem_minmax(0,1fr)] gap-y-6 max-sm:grid-cols-1">
          <h2 className="border-t border-rule pt-3 text-[length:var(--t-3)]">Password</h2>
          <div className="border-t border-rule pt-3"><OwnPasswordForm change={changePassword} /></div>
          <h2 className="border-t border-rule pt-3 text-[length:var(--t-3)]">Look</h2>
          <div className="border-t border-rule pt-3"><ThemeChoice /></div>
          <h2 className="border-t border-rule pt-3 text-[length:var(--t-3)]">Leave</h2>
          <div className="border-t border-rule pt-3"><SignOutButton /></div>
        </div>
      </main>
    </>
  )
}
