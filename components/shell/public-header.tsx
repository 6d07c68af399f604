import Link from 'next/link'

/** The head of the pages that are open to everybody: the name of the product. */
export function PublicHeader() {
  return (
    <header className="border-b border-line px-4 py-2.5 sm:px-6">
      <Link href="/" className="font-head text-[17px] font-semibold text-ink hover:no-underline">
        Inverse <span className="text-accent">Kelvin</span>
      </Link>
    </header>
  )
}
