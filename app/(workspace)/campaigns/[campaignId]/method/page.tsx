import { showOrNotFound } from '@/app/_show-or-not-found'
import { MethodForm } from '@/components/forms/method-form'
import { DataTable } from '@/components/ui/data-table'
import { Facts } from '@/components/ui/facts'
import { Moment } from '@/components/ui/moment'
import { PageBody } from '@/components/ui/page-body'
import { Section } from '@/components/ui/section'
import { requireActor } from '@/lib/access/actor'
import { getCampaign, listMethods } from '@/lib/access/campaigns'
import { getReaction } from '@/lib/access/reactions'
import { methodSettingsSchema } from '@/lib/domain/method'
import { methodFields, methodFieldText, writeOrders } from '@/lib/domain/method-fields'
import { can } from '@/lib/policy/can'
import { saveMethodAction } from './actions'

export const metadata = { title: 'Method' }

function equationOf(step: Readonly<Record<string, number>>): string {
  const side = (sign: 1 | -1) =>
    Object.keys(step)
      .filter((species) => Math.sign(step[species] ?? 0) === sign)
      .map((species) => {
        const count = Math.abs(step[species] ?? 0)
        return count === 1 ? species : `${count} ${species}`
      })
      .join(' + ')
  return `${side(-1)} → ${side(1)}`
}

export default async function MethodPage({ params }: { params: Promise<{ campaignId: string }> }) {
  const actor = await requireActor()
  const { campaignId } = await params
  const [methods, campaign] = await showOrNotFound(
    Promise.all([listMethods(actor, campaignId), getCampaign(actor, campaignId)]),
  )
  const reaction = await getReaction(actor, campaign.reactionId)
  const current = methods[0]
  const steps = reaction.steps.map(equationOf)
  const settings = methodSettingsSchema.parse(current?.settings ?? {})
  return (
    <PageBody>
      <Section title={`Method ${current?.number ?? 0}`} note={current === undefined ? undefined : current.reason}>
        {can.saveMethod(actor, campaignId) && campaign.closedAt === null ? (
          <div className="max-w-[60rem]">
            <MethodForm
              key={current?.number ?? 0}
              settings={settings}
              defaults={methodSettingsSchema.parse({})}
              steps={steps}
              action={saveMethodAction.bind(null, {
                campaignId,
                basedOn: current?.number ?? 0,
                stepCount: steps.length,
              })}
            />
          </div>
        ) : (
          <Facts
            items={[
              ...methodFields.map((field) => ({
                label: field.label,
                value:
                  field.choices?.find((choice) => choice.value === methodFieldText(field, settings))?.label ??
                  (field.kind === 'flag'
                    ? settings[field.key] === true
                      ? 'yes'
                      : 'no'
                    : methodFieldText(field, settings)),
              })),
              ...steps.map((equation, step) => ({
                label: `Orders of ${equation}`,
                value: writeOrders(settings.rateOrders[step] ?? {}) || 'zero order',
              })),
            ]}
          />
        )}
      </Section>
      <Section title="Versions" note="A version is never changed; results follow the newest.">
        <DataTable
          caption="Versions of the method"
          rows={methods}
          rowKey={(row) => row.id}
          columns={[
            { key: 'number', head: 'Version', isRowHead: true, cell: (row) => row.number },
            { key: 'reason', head: 'Reason', cell: (row) => row.reason },
            { key: 'by', head: 'By', cell: (row) => row.createdByName },
            { key: 'at', head: 'When', cell: (row) => <Moment at={row.createdAt} /> },
          ]}
        />
      </Section>
    </PageBody>
  )
}
