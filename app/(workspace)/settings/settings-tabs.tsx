import { TabLinks } from '@/components/ui/tab-links'
import { type Actor } from '@/lib/domain/role'
import { can } from '@/lib/policy/can'

/** The pages of the settings; people are an admin's. */
export function SettingsTabs({ actor }: { readonly actor: Actor }) {
  return (
    <TabLinks
      label="Settings"
      items={[
        { href: '/settings', label: 'Mine' },
        ...(can.manageUsers(actor) ? [{ href: '/settings/people' as const, label: 'People' }] : []),
      ]}
    />
  )
}
