'use client'

import { ErrorPage } from '@/components/shell/error-page'

export default function WorkspaceError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return <ErrorPage digest={error.digest} retry={reset} />
}
