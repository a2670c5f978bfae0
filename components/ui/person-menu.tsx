'use client'
import Link from 'next/link'
import { ChevronDown } from 'lucide-react'
import { signOut } from 'next-auth/react'
import { Button, Menu, MenuItem, MenuTrigger, Popover, Separator } from 'react-aria-components'
import { maySchool, type Actor } from '@/lib/core/actor'

type PersonMenuProps = Readonly<{ actor: Actor; outbox: boolean }>

/** The end of the top bar: where this person may go, then their own name with account and sign-out beneath it. */
export function PersonMenu({ actor, outbox }: PersonMenuProps) {
  const audit = maySchool(actor, 'audit')
  return (
    <>
      {maySchool(actor, 'classes') && <Link href="/classes">Classes</Link>}
      {maySchool(actor, 'people') && <Link href="/people">People</Link>}
      <MenuTrigger>
        <Button className="who">{actor.givenName.charAt(0)}. {actor.familyName} <ChevronDown className="ic" aria-hidden /></Button>
        <Popover placement="bottom end" offset={4}>
          <Menu className="menu" aria-label="You">
            <MenuItem href="/account">Your account</MenuItem>
            {outbox && <MenuItem href="/outbox">Outbox</MenuItem>}
            {audit && <MenuItem href="/audit">Audit lines</MenuItem>}
            <Separator />
            <MenuItem onAction={() => void signOut({ callbackUrl: '/sign-in' })}>Sign out</MenuItem>
          </Menu>
        </Popover>
      </MenuTrigger>
    </>
  )
}
