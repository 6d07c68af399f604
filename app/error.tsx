'use client'

import { ErrorPage } from '@/components/shell/error-page'

export default function RootError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <main id="main">
      <ErrorPage digest={error.digest} retry={reset} />
    </main>
  )
}
