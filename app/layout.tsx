import type { Metadata } from 'next'
import { type ReactNode } from 'react'
import '@fontsource-variable/source-sans-3'
import '@fontsource-variable/source-serif-4'
import './globals.css'

export const metadata: Metadata = {
  title: { default: 'Inverse Kelvin', template: '%s · Inverse Kelvin' },
  description: 'From reactor log to a ranking you can defend.',
}

export default function RootLayout({ children }: { children: ReactNode }) {
  return (
    <html lang="en">
      <body>{children}</body>
    </html>
  )
}
