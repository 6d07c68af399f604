import { routeOf } from '@/app/_route-of'
import { RunsTable } from '@/components/run/runs-table'
import { CampaignsTable } from '@/components/campaign/campaigns-table'
import { EditionsTable } from '@/components/edition/editions-table'
import { EmptyState } from '@/components/ui/empty-state'
import { LinkButton } from '@/components/ui/link-button'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { Section } from '@/components/ui/section'
import { SetUpSteps, type SetUpStep } from '@/components/shell/set-up-steps'
import { requireActor } from '@/lib/access/actor'
import { listCalibrations } from '@/lib/access/calibrations'
import { listCampaigns } from '@/lib/access/campaigns'
import { listEditions } from '@/lib/access/editions'
import { listReactions } from '@/lib/access/reactions'
import { listRigs } from '@/lib/access/rigs'
import { listRuns } from '@/lib/access/runs'
import { listSamples } from '@/lib/access/samples'
import { type Actor } from '@/lib/domain/role'
import { type RunSummary } from '@/lib/domain/run'
import { can } from '@/lib/policy/can'

export const metadata = { title: 'Start' }

/** Runs that wait for this person: files to add or a run to hand in, and for a lead what has to be decided. */
function waitingFor(actor: Actor, runs: readonly RunSummary[]) {
  return {
    toFill: runs.filter((run) => run.state === 'open' && run.fileCount === 0 && can.addFiles(actor, run)),
    toHandIn: runs.filter((run) => run.state === 'open' && run.fileCount > 0 && can.handIn(actor, run)),
    toDecide: runs.filter((run) => run.state === 'handed-in' && can.decide(actor, run.campaignId, run)),
  }
}

export default async function StartPage() {
  const actor = await requireActor()
  const campaigns = await listCampaigns(actor)
  if (!can.readHouse(actor)) {
    const editions = await listEditions(actor)
    return (
      <>
        <PageHead title="Start" />
        <PageBody>
          {editions.length === 0 ? (
            <EmptyState title="Nothing to read yet">
              Published editions of the campaigns you were invited to are shown here. None has been published yet.
            </EmptyState>
          ) : (
            <Section title="Editions" note="Of the campaigns you were invited to, newest first.">
              <EditionsTable editions={editions} caption="Editions you may read" empty="" hasCampaign />
            </Section>
          )}
        </PageBody>
      </>
    )
  }
  const [reactions, rigs, calibrations, samples, runs] = await Promise.all([
    listReactions(actor),
    listRigs(actor),
    listCalibrations(actor),
    listSamples(actor),
    listRuns(actor),
  ])
  const zones = new Map(rigs.map((rig) => [rig.id, rig.timeZone]))
  const zoneOf = (run: RunSummary) => zones.get(run.rigId) ?? 'UTC'
  const { toFill, toHandIn, toDecide } = waitingFor(actor, runs)
  const steps: SetUpStep[] = [
    {
      name: 'Reaction',
      href: routeOf('/reactions/new'),
      isDone: reactions.length > 0,
      words: 'Equations and key reactant; equilibrium comes from built-in thermochemistry.',
    },
    {
      name: 'Rig',
      href: routeOf('/rigs/new'),
      isDone: rigs.length > 0,
      words: 'Channels, clock, limits, and the state its flow controllers count at. An admin enters it.',
    },
    {
      name: 'Calibration',
      href: routeOf('/calibrations'),
      isDone: calibrations.length > 0,
      words: 'Drop the analyser’s table of response factors.',
    },
    {
      name: 'Sample',
      href: routeOf('/samples/new'),
      isDone: samples.length > 0,
      words: 'What is tested; a site count gives turnover frequencies.',
    },
    {
      name: 'Campaign',
      href: routeOf('/campaigns/new'),
      isDone: campaigns.length > 0,
      words: 'Samples compared in one reaction under one method. A lead makes it.',
    },
    {
      name: 'Run',
      href: routeOf('/runs/new'),
      isDone: runs.length > 0,
      words: 'Log it, add the rig log and the analyser file, look at the points.',
    },
  ]
  return (
    <>
      <PageHead
        title="Start"
        actions={campaigns.length === 0 ? null : <LinkButton href="/runs/new">Log a run</LinkButton>}
      />
      <PageBody>
        {steps.every((step) => step.isDone) ? null : <SetUpSteps steps={steps} />}
        {toDecide.length > 0 ? (
          <Section title="Waiting for your decision">
            <RunsTable runs={toDecide} timeZoneOf={zoneOf} empty="" caption="Runs waiting for your decision" />
          </Section>
        ) : null}
        {toHandIn.length > 0 ? (
          <Section title="To hand in">
            <RunsTable runs={toHandIn} timeZoneOf={zoneOf} empty="" caption="Runs to hand in" />
          </Section>
        ) : null}
        {toFill.length > 0 ? (
          <Section title="Files to add">
            <RunsTable runs={toFill} timeZoneOf={zoneOf} empty="" caption="Runs without files" />
          </Section>
        ) : null}
        {campaigns.length > 0 ? (
          <Section title="My campaigns">
            <CampaignsTable campaigns={campaigns} caption="My campaigns" />
          </Section>
        ) : null}
      </PageBody>
    </>
  )
}
