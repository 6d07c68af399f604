import Link from 'next/link'
import { showOrNotFound } from '@/app/_show-or-not-found'
import { SampleLines } from '@/components/campaign/sample-lines'
import { AddToCampaignForm } from '@/components/forms/add-to-campaign-form'
import { LotForm } from '@/components/forms/lot-form'
import { SampleForm } from '@/components/forms/sample-form'
import { SiteCountForm } from '@/components/forms/site-count-form'
import { RunsTable } from '@/components/run/runs-table'
import { DataTable } from '@/components/ui/data-table'
import { Facts } from '@/components/ui/facts'
import { Fold } from '@/components/ui/fold'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { Section } from '@/components/ui/section'
import { ValueWithUncertainty } from '@/components/ui/value-with-uncertainty'
import { requireActor } from '@/lib/access/actor'
import { listCampaigns } from '@/lib/access/campaigns'
import { listRigs } from '@/lib/access/rigs'
import { listRuns } from '@/lib/access/runs'
import { getSample, listCampaignsOfSample, listLots, listSiteCounts } from '@/lib/access/samples'
import { formatQuantity } from '@/lib/analysis/units/format-quantity'
import { formatDay } from '@/lib/domain/format-instant'
import { can } from '@/lib/policy/can'
import { addLotAction, addSiteCountAction, addToCampaignAction, changeSampleAction } from '../actions'

export const metadata = { title: 'Sample' }

export default async function SamplePage({ params }: { params: Promise<{ sampleId: string }> }) {
  const actor = await requireActor()
  const { sampleId } = await params
  const sample = await showOrNotFound(getSample(actor, sampleId))
  const [lots, siteCounts, runs, rigs, campaigns, campaignIds] = await Promise.all([
    listLots(actor, sampleId),
    listSiteCounts(actor, sampleId),
    listRuns(actor, { sampleId }),
    listRigs(actor),
    listCampaigns(actor),
    listCampaignsOfSample(actor, sampleId),
  ])
  const mine = campaigns.filter(({ id }) => campaignIds.includes(id))
  const read = mine.filter(({ id }) => can.readCampaign(actor, id)).map(({ id, name }) => ({ id, name }))
  const others = campaigns.filter(
    ({ id, closedAt }) => closedAt === null && !campaignIds.includes(id) && can.addSampleToCampaign(actor, id),
  )
  const fraction = (value: number | null) =>
    value === null ? null : formatQuantity(value, 'fraction', { unit: '%', significantDigits: 3 })
  const facts = [
    { label: 'Composition', value: sample.composition },
    {
      label: 'Active metal',
      value: [sample.activeMetal, fraction(sample.metalMassFraction)].filter(Boolean).join(', '),
    },
    {
      label: 'Particle density',
      value: sample.particleDensityKgPerM3 === null ? '' : formatQuantity(sample.particleDensityKgPerM3, 'density'),
    },
    { label: 'Pore share', value: fraction(sample.poreFraction) ?? '' },
    { label: 'Tortuosity', value: sample.tortuosity === null ? '' : String(sample.tortuosity) },
    {
      label: 'Mean pore radius',
      value: sample.meanPoreRadiusM === null ? '' : formatQuantity(sample.meanPoreRadiusM, 'length'),
    },
    { label: 'Void share of the bed', value: fraction(sample.bedVoidFraction) ?? '' },
    { label: 'Notes', value: sample.notes },
  ].filter(({ value }) => value !== '')
  const lotOf = (id: string | null) => lots.find((lot) => lot.id === id)?.code ?? 'all'
  return (
    <>
      <PageHead
        title={sample.code}
        of={sample.name}
        meta={
          mine.length === 0 ? (
            'in no campaign that you are a member of'
          ) : (
            <>
              in{' '}
              {mine.map((campaign, position) => (
                <span key={campaign.id}>
                  {position === 0 ? '' : ', '}
                  <Link href={`/campaigns/${campaign.id}`}>{campaign.name}</Link>
                </span>
              ))}
            </>
          )
        }
      />
      <PageBody>
        {facts.length === 0 ? null : <Facts items={facts} />}
        <Section title="Site counts" note="Turnover frequencies divide by these.">
          <DataTable
            caption="Site counts"
            rows={siteCounts}
            rowKey={(row) => row.id}
            empty="No site count yet. Without one, rates are per mass only."
            columns={[
              { key: 'method', head: 'Method', isRowHead: true, cell: (row) => row.method },
              {
                key: 'value',
                head: 'Sites',
                unit: 'µmol g⁻¹, one standard uncertainty',
                isNumber: true,
                cell: (row) => (
                  <ValueWithUncertainty
                    value={row.molPerKg * 1e3}
                    uncertainty={row.molPerKg * 1e3 * row.relativeStandardUncertainty}
                  />
                ),
              },
              { key: 'lot', head: 'Lot', cell: (row) => lotOf(row.lotId) },
              { key: 'state', head: 'State', cell: (row) => row.state },
              {
                key: 'on',
                head: 'Counted',
                cell: (row) => (row.countedAt === null ? '' : formatDay(row.countedAt, 'UTC')),
              },
              { key: 'notes', head: 'Notes', cell: (row) => row.notes },
            ]}
          />
          {can.addSiteCount(actor) ? (
            <Fold label="Add a site count">
              <SiteCountForm lots={lots} action={addSiteCountAction.bind(null, sample.id)} />
            </Fold>
          ) : null}
        </Section>
        <Section title="Lots">
          <DataTable
            caption="Lots"
            rows={lots}
            rowKey={(row) => row.id}
            empty="No lot named yet; beds are of the sample as a whole."
            columns={[
              { key: 'code', head: 'Lot', isRowHead: true, cell: (row) => row.code },
              { key: 'made', head: 'Made', cell: (row) => (row.madeAt === null ? '' : formatDay(row.madeAt, 'UTC')) },
              { key: 'notes', head: 'Notes', cell: (row) => row.notes },
            ]}
          />
          {can.addLot(actor) ? (
            <Fold label="Add a lot">
              <LotForm action={addLotAction.bind(null, sample.id)} />
            </Fold>
          ) : null}
        </Section>
        <Section title="Runs">
          <RunsTable
            runs={runs}
            timeZoneOf={(run) => rigs.find(({ id }) => id === run.rigId)?.timeZone ?? 'UTC'}
            empty="No run on this sample yet."
          />
        </Section>
        {read.length === 0 || runs.length === 0 ? null : (
          <Section title="Arrhenius lines" note="one a run; the empty mark is the value the sample is ranked by">
            <SampleLines sampleId={sample.id} campaigns={read} />
          </Section>
        )}
        {others.length > 0 ? (
          <Section title="Campaigns">
            <AddToCampaignForm campaigns={others} action={addToCampaignAction.bind(null, sample.id)} />
          </Section>
        ) : null}
        {can.editSample(actor) ? (
          <Section title="Change">
            <Fold label="Change what is written about the sample">
              <div className="max-w-[46rem]">
                <SampleForm
                  key={sample.version}
                  sample={sample}
                  campaigns={[]}
                  action={changeSampleAction.bind(null, { id: sample.id, version: sample.version })}
                />
              </div>
            </Fold>
          </Section>
        ) : null}
      </PageBody>
    </>
  )
}
