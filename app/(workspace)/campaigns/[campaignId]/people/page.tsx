import { showOrNotFound } from '@/app/_show-or-not-found'
import { ActionForm } from '@/components/ui/action-form'
import { DataTable } from '@/components/ui/data-table'
import { PageBody } from '@/components/ui/page-body'
import { Section } from '@/components/ui/section'
import { SelectField } from '@/components/ui/select-field'
import { requireActor } from '@/lib/access/actor'
import { listMembers } from '@/lib/access/campaigns'
import { listPersonNames } from '@/lib/access/users'
import { can } from '@/lib/policy/can'
import { addMemberAction, changeMemberAction } from './actions'

export const metadata = { title: 'People' }

const ROLES = [
  { value: 'technician', label: 'technician: logs runs, adds files' },
  { value: 'researcher', label: 'researcher: reduces, questions, leaves out' },
  { value: 'lead', label: 'lead: decides, sets the method' },
  { value: 'guest', label: 'guest: published editions only' },
]

export default async function CampaignPeoplePage({ params }: { params: Promise<{ campaignId: string }> }) {
  const actor = await requireActor()
  const { campaignId } = await params
  const members = await showOrNotFound(listMembers(actor, campaignId))
  const mayManage = can.manageMembers(actor, campaignId)
  const others = mayManage
    ? (await listPersonNames(actor)).filter(({ id }) => !members.some((member) => member.userId === id))
    : []
  return (
    <PageBody>
      <Section title="People" note="Who is not here does not see that the campaign exists.">
        <DataTable
          caption="People of the campaign"
          rows={members}
          rowKey={(row) => row.userId}
          columns={[
            { key: 'name', head: 'Name', isRowHead: true, cell: (row) => row.displayName },
            { key: 'email', head: 'E-mail', cell: (row) => row.email },
            {
              key: 'role',
              head: 'Role here',
              cell: (row) => `${row.role}${row.isDisabled ? ', account closed' : ''}`,
            },
            ...(mayManage
              ? [
                  {
                    key: 'change',
                    head: 'Change',
                    cell: (row: (typeof members)[number]) => (
                      <ActionForm
                        action={changeMemberAction.bind(null, { campaignId, userId: row.userId })}
                        submitLabel="Save"
                        className="max-w-xs"
                      >
                        <SelectField
                          name="role"
                          label={`Role of ${row.displayName}`}
                          defaultValue={row.role}
                          choices={[...ROLES, { value: 'none', label: 'no part in this campaign any more' }]}
                        />
                      </ActionForm>
                    ),
                  },
                ]
              : []),
          ]}
        />
      </Section>
      {mayManage ? (
        <Section title="Add somebody">
          <ActionForm
            action={addMemberAction.bind(null, campaignId)}
            submitLabel="Add"
            className="max-w-[30rem]"
            isEmptiedWhenSaved
          >
            <div className="grid gap-3">
              <SelectField
                name="userId"
                label="Person"
                unchosen="Choose a person"
                choices={others.map((person) => ({ value: person.id, label: person.displayName }))}
                hint="An admin makes accounts under Settings, People."
              />
              <SelectField name="role" label="Role here" unchosen="Choose a role" choices={ROLES} />
            </div>
          </ActionForm>
        </Section>
      ) : null}
    </PageBody>
  )
}
