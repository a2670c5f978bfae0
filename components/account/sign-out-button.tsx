'use client'
import { signOut } from 'next-auth/react'

export function SignOutButton() {
  return <button className="btn" onClick={() => void signOut({ callbackUrl: '/sign-in' })}>Sign out</button>
}
