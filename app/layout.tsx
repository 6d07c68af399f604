import type { Metadata, Viewport } from 'next'
import { type ReactNode } from 'react'
import '@fontsource-variable/source-sans-3/wght.css'
import '@fontsource-variable/source-serif-4/wght.css'
import './globals.css'

// Every page is rendered on request: the script policy carries a fresh nonce, and what is shown depends on who asks.
export const dynamic = 'force-dynamic'

export const metadata: Metadata = {
  title: { default: 'Inverse Kelvin', template: '%s · Inverse Kelvin' },
  description: 'From reactor log to a ranking you can defend.',
}

export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  themeColor: [
    { media: '(prefers-color-scheme: light)', color: '#fbfaf6' },
    { media: '(prefers-color-scheme: dark)', color: '#141619' },
  ],
}

export default function RootLayout({ children }: { children: ReactNode }) {
  return (
    <html lang="en-GB">
      <body>{children}</body>
    </html>
  )
}
