import { notFound } from 'next/navigation'
import { ActionButton } from '@/components/forms/action-button'
import { InviteAgain } from '@/components/forms/invite-again'
import { PersonForm } from '@/components/forms/person-form'
import { RoleForm } from '@/components/forms/role-form'
import { DataTable } from '@/components/ui/data-table'
import { Moment } from '@/components/ui/moment'
import { PageHead } from '@/components/ui/page-head'
import { Section } from '@/components/ui/section'
import { Tag } from '@/components/ui/tag'
import { requireActor } from '@/lib/access/actor'
import { listPeople } from '@/lib/access/users'
import { type PersonSummary } from '@/lib/domain/person'
import { can } from '@/lib/policy/can'
import { SettingsTabs } from '../settings-tabs'
import {
  changeRoleAction,
  createPersonAction,
  endSessionsOfAction,
  inviteAgainAction,
  openOrCloseAction,
} from './actions'

export const metadata = { title: 'People' }

export default async function PeoplePage() {
  const actor = await requireActor()
  if (!can.manageUsers(actor)) notFound()
  const people = await listPeople(actor)
  return (
    <>
      <PageHead title="Settings" meta="People who may sign in, and what they are in the house" />
      <SettingsTabs actor={actor} />
      <div className="px-4 sm:px-6">
        <Section title="People" note={`${people.length}`}>
          <DataTable
            caption="People"
            rows={people}
            rowKey={(person) => person.id}
            columns={[
              {
                key: 'name',
                head: 'Name',
                isRowHead: true,
                cell: (person) => (
                  <>
                    {person.displayName} <PersonTags person={person} />
                    <span className="block text-[13px] text-ink-2">{person.email}</span>
                  </>
                ),
              },
              {
                key: 'role',
                head: 'Role in the house',
                cell: (person) =>
                  person.id === actor.userId ? (
                    `${person.role} (you)`
                  ) : (
                    <RoleForm
                      action={changeRoleAction}
                      userId={person.id}
                      name={person.displayName}
                      role={person.role}
                      version={person.version}
                    />
                  ),
              },
              {
                key: 'seen',
                head: 'Last seen',
                cell: (person) => (person.lastSeenAt === null ? 'never' : <Moment at={person.lastSeenAt} />),
              },
              { key: 'sessions', head: 'Sessions', isNumber: true, cell: (person) => person.sessionCount },
              {
                key: 'actions',
                head: <span className="sr-only">What to do</span>,
                cell: (person) =>
                  person.id === actor.userId ? null : (
                    <div className="flex flex-wrap justify-end gap-2">
                      {person.isDisabled ? null : (
                        <InviteAgain
                          action={inviteAgainAction}
                          userId={person.id}
                          name={person.displayName}
                          hasPassword={person.hasPassword}
                        />
                      )}
                      {person.sessionCount === 0 ? null : (
                        <ActionButton
                          action={endSessionsOfAction}
                          fields={{ userId: person.id }}
                          label="End sessions"
                          describes={person.displayName}
                          busyLabel="Ending"
                        />
                      )}
                      <OpenOrClose person={person} />
                    </div>
                  ),
              },
            ]}
          />
        </Section>
        <Section title="Invite somebody">
          <div className="max-w-[38rem]">
            <PersonForm action={createPersonAction} />
          </div>
        </Section>
      </div>
    </>
  )
}

function PersonTags({ person }: { readonly person: PersonSummary }) {
  if (person.isDisabled) return <Tag>closed</Tag>
  if (person.isLocked) return <Tag kind="fault">locked after wrong passwords</Tag>
  return person.hasPassword ? null : <Tag kind="doubt">invited</Tag>
}

function OpenOrClose({ person }: { readonly person: PersonSummary }) {
  const fields = { userId: person.id, version: String(person.version), isDisabled: person.isDisabled ? 'no' : 'yes' }
  return person.isDisabled ? (
    <ActionButton
      action={openOrCloseAction}
      fields={fields}
      label="Open again"
      describes={person.displayName}
      busyLabel="Opening"
    />
  ) : (
    <ActionButton
      action={openOrCloseAction}
      fields={fields}
      label="Close"
      describes={person.displayName}
      busyLabel="Closing"
      kind="danger"
      question={{
        title: `Close the account of ${person.displayName}?`,
        text: 'Sessions and tokens end at once. What the person did stays, under their name. The account can be opened again; tokens stay ended.',
      }}
    />
  )
}
