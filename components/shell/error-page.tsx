'use client'

import Link from 'next/link'
import { Button } from '@/components/ui/button'

/** Something failed that nobody foresaw: what to do now, and the number under which the log holds the cause. */
export function ErrorPage({ digest, retry }: { readonly digest: string | undefined; readonly retry: () => void }) {
  return (
    <div className="prose mx-auto max-w-[62ch] px-4 py-12 sm:px-6">
      <h1>This page could not be shown</h1>
      <p className="mt-2 text-ink-2">
        Nothing that was saved is lost. Try again; if it keeps failing, tell whoever runs this installation
        {digest === undefined ? (
          '.'
        ) : (
          <>
            {' '}
            and give them the number <strong className="font-semibold text-ink">{digest}</strong>, under which the log
            holds the cause.
          </>
        )}
      </p>
      <div className="mt-5 flex flex-wrap items-center gap-4">
        <Button kind="main" onClick={retry}>
          Try again
        </Button>
        <Link href="/">Go to the start page</Link>
      </div>
    </div>
  )
}
