import { getDatabase } from '@/db/client'
import { members, users } from '@/db/schema'
import { createCampaign } from '@/lib/access/campaigns'
import { createReaction } from '@/lib/access/reactions'
import { createRig } from '@/lib/access/rigs'
import { createRun } from '@/lib/access/runs'
import { createSample } from '@/lib/access/samples'
import { type NewRun, newRunSchema } from '@/lib/domain/run'
import { newReactionSchema } from '@/lib/domain/reaction'
import { newRigSchema } from '@/lib/domain/rig'
import { newSampleSchema } from '@/lib/domain/sample'
import { type Actor, type CampaignRole } from '@/lib/domain/role'
import { actorOf } from './actors'

const parts = ['technician', 'researcher', 'lead', 'guest'] as const

/** Every role of two campaigns, one sample and one run in each: what one campaign's people do must never meet the other's rows. */
export async function makeLaboratory() {
  const db = await getDatabase()
  const accounts = ['own', 'other'].flatMap((side) => parts.map((role) => ({ id: `${side}-${role}`, role })))
  await db.insert(users).values(
    [...accounts, { id: 'admin', role: 'admin' }, { id: 'stranger', role: 'researcher' }].map(({ id, role }) => ({
      id,
      email: `${id}@example.test`,
      displayName: id,
      role,
      passwordHash: 'none',
      passwordScheme: 'none',
    })),
  )
  const admin = actorOf('admin', { userId: 'admin' })
  const reaction = await createReaction(
    admin,
    newReactionSchema.parse({
      code: 'METH',
      name: 'Methanation',
      keyReactant: 'CO2',
      steps: [{ CO2: -1, H2: -4, CH4: 1, H2O: 2 }],
    }),
  )
  const rig = await createRig(
    admin,
    newRigSchema.parse({ code: 'Rig B', name: 'One tube', channels: [{ code: '1' }, { code: '2' }] }),
  )
  const side = async (name: 'own' | 'other') => {
    const founder = actorOf('lead', { userId: `${name}-lead` })
    const campaign = await createCampaign(founder, {
      code: `C-${name}`,
      name: `Campaign ${name}`,
      laboratory: '',
      description: '',
      reactionId: reaction.id,
      referenceSampleId: null,
    })
    await db
      .insert(members)
      .values(
        parts
          .filter((role) => role !== 'lead')
          .map((role) => ({ campaignId: campaign.id, userId: `${name}-${role}`, role })),
      )
    const actor = (role: CampaignRole, more: Partial<Actor> = {}) =>
      actorOf(role, { userId: `${name}-${role}`, memberships: { [campaign.id]: role }, ...more })
    const lead = actor('lead')
    const sample = await createSample(
      lead,
      newSampleSchema.parse({ code: `S-${name}`, name: `Sample ${name}`, campaignIds: [campaign.id] }),
    )
    const runInput = (more: object = {}): NewRun =>
      newRunSchema.parse({
        campaignId: campaign.id,
        rigId: rig.id,
        channel: '1',
        loading: { sampleId: sample.id, catalystMassKg: 1e-4 },
        startedAt: '2026-03-02T07:30:00+01:00',
        ...more,
      })
    const run = await createRun(actor('technician'), runInput())
    return { campaign, actor, lead, sample, run, runInput }
  }
  return { admin, reaction, rig, own: await side('own'), other: await side('other') }
}
