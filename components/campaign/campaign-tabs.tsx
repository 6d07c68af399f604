'use client'

import Link from 'next/link'
import { type Route } from 'next'
import { usePathname } from 'next/navigation'

export interface CampaignTab {
  readonly label: string
  /** below the campaign's own address; empty for the ranking */
  readonly path: string
}

/** The pages of one campaign. */
export function CampaignTabs({ campaignId, tabs }: { campaignId: string; tabs: readonly CampaignTab[] }) {
  const here = usePathname()
  const base = `/campaigns/${campaignId}`
  return (
    <nav
      aria-label="Campaign"
      className="flex gap-x-[22px] overflow-x-auto border-b border-line px-4 sm:px-6 print:hidden"
    >
      {tabs.map((tab) => {
        const href = tab.path === '' ? base : `${base}/${tab.path}`
        const isHere = tab.path === '' ? here === base : here === href || here.startsWith(`${href}/`)
        return (
          <Link
            key={tab.path}
            // the parts are route segments of this application, put together at run time
            href={href as Route}
            aria-current={isHere ? 'page' : undefined}
            className={`py-[7px] whitespace-nowrap no-underline max-sm:py-2.5 ${
              isHere ? 'border-b-2 border-accent font-semibold text-ink' : 'text-ink-2 hover:text-ink'
            }`}
          >
            {tab.label}
          </Link>
        )
      })}
    </nav>
  )
}
