'use client'
import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { useState, type ReactNode } from 'react'
import { RefusedError } from './ask'

/** What live screens read and save over and over goes through one cache. A refusal is not asked again. */
export function LiveData({ children }: { children: ReactNode }) {
  const [client] = useState(() => new QueryClient({
    defaultOptions: { queries: { retry: (count, error) => !(error instanceof RefusedError && error.status > 0) && count < 3, refetchOnWindowFocus: true } },
  }))
  return <QueryClientProvider client={client}>{children}</QueryClientProvider>
}
