import { listCampaigns, listCampaignSamples } from '@/lib/access/campaigns'
import { listLoadings } from '@/lib/access/loadings'
import { listReactions } from '@/lib/access/reactions'
import { listRigs } from '@/lib/access/rigs'
import { lastRunOnRig } from '@/lib/access/runs'
import { listLots, listSamples } from '@/lib/access/samples'
import { keyReactantEnthalpy } from '@/lib/domain/reaction-enthalpy'
import { type Actor } from '@/lib/domain/role'
import { type Loading, type Run } from '@/lib/domain/run'
import { type RunFormChoices } from '@/lib/domain/run-form'
import { can } from '@/lib/policy/can'

/** What "Log a run" chooses from, for this person: the campaigns they may add runs to and what belongs to those. */
export async function runFormChoices(actor: Actor): Promise<RunFormChoices> {
  const [allCampaigns, reactions, samples, rigs, loadings] = await Promise.all([
    listCampaigns(actor),
    listReactions(actor),
    listSamples(actor),
    listRigs(actor),
    listLoadings(actor),
  ])
  const campaigns = allCampaigns.filter(({ id, closedAt }) => closedAt === null && can.addRun(actor, id))
  const [inCampaigns, lots, lastRuns] = await Promise.all([
    Promise.all(campaigns.map(async ({ id }) => ({ id, members: await listCampaignSamples(actor, id) }))),
    Promise.all(samples.map(async ({ id }) => ({ id, lots: await listLots(actor, id) }))),
    Promise.all(rigs.map(({ id }) => lastRunOnRig(actor, id))),
  ])
  return {
    campaigns: campaigns.map(({ id, code, name, reactionId }) => {
      const reaction = reactions.find((one) => one.id === reactionId)
      return {
        id,
        code,
        name,
        reaction:
          reaction === undefined
            ? null
            : { name: reaction.name, keyReactant: reaction.keyReactant, steps: reaction.steps },
        reactionEnthalpyJPerMol: reaction === undefined ? null : keyReactantEnthalpy(reaction),
      }
    }),
    samples: samples.map(({ id, code, name, activeMetal }) => ({
      id,
      code,
      name,
      activeMetal,
      campaignIds: inCampaigns
        .filter(({ members }) => members.some(({ sampleId }) => sampleId === id))
        .map((campaign) => campaign.id),
      lots: (lots.find((one) => one.id === id)?.lots ?? []).map((lot) => ({ id: lot.id, code: lot.code })),
    })),
    rigs,
    bedsIn: newestBeds(loadings),
    lastRuns: lastRuns
      .filter((run): run is Run => run !== null)
      .sort((a, b) => Date.parse(b.startedAt) - Date.parse(a.startedAt)),
  }
}

/** The bed packed last into each channel of each rig. */
function newestBeds(loadings: readonly Loading[]): Loading[] {
  const newest = new Map<string, Loading>()
  for (const loading of loadings) {
    const place = `${loading.rigId} ${loading.channel}`
    const other = newest.get(place)
    if (other === undefined || (loading.packedAt ?? '') > (other.packedAt ?? '')) newest.set(place, loading)
  }
  return [...newest.values()]
}
