'use client'

import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { type ReactNode, useState } from 'react'
import { RequestError } from './fetch-json'

/** One client a tab: what was fetched is shared by the parts of the page that show it. */
export function QueryProvider({ children }: { children: ReactNode }) {
  const [client] = useState(
    () =>
      new QueryClient({
        defaultOptions: {
          queries: {
            staleTime: 15_000,
            // an answer that says no will say no again
            retry: (count, error) => !(error instanceof RequestError && error.status < 500) && count < 2,
          },
        },
      }),
  )
  return <QueryClientProvider client={client}>{children}</QueryClientProvider>
}
