import Link from 'next/link'

export const metadata = { title: 'Not found' }

export default function NotFound() {
  return (
    <main id="main" className="prose mx-auto max-w-[62ch] px-4 py-12 sm:px-6">
      <h1>Nothing here</h1>
      <p className="mt-2 text-ink-2">
        There is no such page, or it belongs to a campaign that you are not a member of. Check the address, or ask the
        lead of the campaign to add you.
      </p>
      <p className="mt-4">
        <Link href="/">Go to the start page</Link>
      </p>
    </main>
  )
}
