import type { Metadata, Viewport } from 'next'
import type { ReactNode } from 'react'
import { ThemeScript } from '@/components/ui/theme-script'
import { fontClasses } from './fonts'
import './globals.css'

export const metadata: Metadata = { title: { default: 'Sheafmark', template: '%s · Sheafmark' }, icons: { icon: '/logo.svg' }, referrer: 'same-origin' }
export const viewport: Viewport = { width: 'device-width', initialScale: 1 }
// Every page asks who is signed in.
export const dynamic = 'force-dynamic'

export default function RootLayout({ children }: { children: ReactNode }) {
  return (
    <html lang="en-GB" className={fontClasses} suppressHydrationWarning>
      <body>
        <ThemeScript />
        {children}
      </body>
    </html>
  )
}
