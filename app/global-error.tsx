'use client'

import '@fontsource-variable/source-sans-3/wght.css'
import '@fontsource-variable/source-serif-4/wght.css'
import { ErrorPage } from '@/components/shell/error-page'
import './globals.css'

export default function GlobalError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <html lang="en-GB">
      <body>
        <title>Inverse Kelvin</title>
        <main id="main">
          <ErrorPage digest={error.digest} retry={reset} />
        </main>
      </body>
    </html>
  )
}
