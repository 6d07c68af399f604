import { showOrNotFound } from '@/app/_show-or-not-found'
import { RigForm } from '@/components/forms/rig-form'
import { Facts } from '@/components/ui/facts'
import { LinkButton } from '@/components/ui/link-button'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { Section } from '@/components/ui/section'
import { RunsTable } from '@/components/run/runs-table'
import { requireActor } from '@/lib/access/actor'
import { getRig } from '@/lib/access/rigs'
import { listRuns } from '@/lib/access/runs'
import { formatQuantity } from '@/lib/analysis/units/format-quantity'
import { rigReference } from '@/lib/domain/run-form'
import { can } from '@/lib/policy/can'
import { changeRigAction } from '../actions'

export const metadata = { title: 'Rig' }

export default async function RigPage({ params }: { params: Promise<{ rigId: string }> }) {
  const actor = await requireActor()
  const { rigId } = await params
  const rig = await showOrNotFound(getRig(actor, rigId))
  const runs = await listRuns(actor, { rigId })
  const reference = rigReference(rig)
  return (
    <>
      <PageHead
        title={rig.code}
        of={rig.name === rig.code ? undefined : rig.name}
        meta={`${rig.reactorKind.replace('-', ' ')}, clock in ${rig.timeZone}`}
        actions={<LinkButton href={`/runs/new?rig=${rig.id}`}>Log a run on it</LinkButton>}
      />
      <PageBody>
        <Facts
          items={[
            {
              label: 'Channels',
              value: rig.channels
                .map(({ code, tubeInnerDiameterM }) =>
                  tubeInnerDiameterM === null
                    ? code
                    : `${code} (${formatQuantity(tubeInnerDiameterM, 'length')} inside)`,
                )
                .join(', '),
            },
            {
              label: 'Highest pressure',
              value:
                rig.maximumPressurePa === null
                  ? 'not entered'
                  : `${formatQuantity(rig.maximumPressurePa, 'pressure')} absolute`,
            },
            {
              label: 'Highest temperature',
              value:
                rig.maximumTemperatureK === null
                  ? 'not entered'
                  : formatQuantity(rig.maximumTemperatureK, 'temperature'),
            },
            { label: 'Usual air pressure', value: formatQuantity(rig.barometerPa, 'pressure', { unit: 'mbar' }) },
            { label: 'Bed to analyser', value: formatQuantity(rig.lineLagS, 'time') },
            {
              label: 'Volumes counted at',
              value:
                reference === null
                  ? 'not known, asked with each run'
                  : `${formatQuantity(reference.temperatureK, 'temperature')} and ${formatQuantity(reference.pressurePa, 'pressure', { significantDigits: 6 })}`,
            },
            ...(rig.notes === '' ? [] : [{ label: 'Notes', value: rig.notes }]),
          ]}
        />
        <Section title="Runs">
          <RunsTable runs={runs} timeZoneOf={() => rig.timeZone} empty="No run on this rig that you may see." />
        </Section>
        {can.manageRigs(actor) ? (
          <Section title="Change">
            <div className="max-w-[46rem]">
              <RigForm
                key={rig.version}
                rig={rig}
                action={changeRigAction.bind(null, { id: rig.id, version: rig.version })}
              />
            </div>
          </Section>
        ) : null}
      </PageBody>
    </>
  )
}
