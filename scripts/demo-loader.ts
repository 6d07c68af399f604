import path from 'node:path'
import {
  DEMO_PASSWORD,
  demoFeed,
  demoMethodChange,
  demoPeople,
  demoReaction,
  demoRigs,
  demoRuns,
  demoSamples,
  type DemoRun,
} from '../db/demo/demo-campaign'
import { actorOfSession } from '../lib/access/actor-of-secret'
import { addMember, createCampaign, getCurrentMethod, saveMethod } from '../lib/access/campaigns'
import { createReaction } from '../lib/access/reactions'
import { createRig } from '../lib/access/rigs'
import { addSiteCount, createSample } from '../lib/access/samples'
import { createRun, decide, getRun, handIn } from '../lib/access/runs'
import { acceptInvitation, createPerson } from '../lib/access/users'
import { makeAdminByCommand } from '../lib/access/set-up'
import { signIn } from '../lib/access/sign-in'
import { molarFlowFromVolumeFlow } from '../lib/analysis/units/molar-flow-from-volume-flow'
import { newReactionSchema } from '../lib/domain/reaction'
import { newRigSchema } from '../lib/domain/rig'
import { newSampleSchema, newSiteCountSchema } from '../lib/domain/sample'
import { newCampaignSchema } from '../lib/domain/campaign'
import { newRunSchema } from '../lib/domain/run'
import { type Actor } from '../lib/domain/role'
import { addDemoCalibration, addDemoFile } from './demo-intake'

const FILES = path.resolve(import.meta.dirname, '../db/demo/files')
const CALLER = { address: '127.0.0.1', userAgent: 'demo loader', knownPeople: [] }

type PersonKey = (typeof demoPeople)[number]['key']

async function signedIn(email: string): Promise<Actor> {
  const { secret } = await signIn({ email, password: DEMO_PASSWORD }, CALLER)
  const actor = await actorOfSession(secret)
  if (actor === null) throw new Error(`${email} could not sign in`)
  return actor
}

async function makePeople(): Promise<Map<PersonKey, string>> {
  const ids = new Map<PersonKey, string>()
  const admin = demoPeople.find((person) => person.role === 'admin')
  if (admin === undefined) throw new Error('the demo has no admin')
  await makeAdminByCommand({ email: admin.email, displayName: admin.displayName, password: DEMO_PASSWORD })
  const actor = await signedIn(admin.email)
  ids.set(admin.key, actor.userId)
  for (const person of demoPeople) {
    if (person.role === 'admin') continue
    const invitation = await createPerson(actor, {
      email: person.email,
      displayName: person.displayName,
      role: person.role,
    })
    await acceptInvitation({ code: invitation.code, password: DEMO_PASSWORD }, CALLER)
    ids.set(person.key, invitation.userId)
  }
  return ids
}

const emailOf = (key: PersonKey) => demoPeople.find((person) => person.key === key)?.email ?? ''

function plannedRun(run: DemoRun, campaignId: string, rigId: string, sampleId: string) {
  const reference = { temperatureK: 273.15, pressurePa: 101_325 }
  return newRunSchema.parse({
    campaignId,
    code: run.code,
    rigId,
    channel: run.channel,
    kind: run.kind,
    loading: {
      sampleId,
      catalystMassKg: run.catalystMassKg,
      massRelativeStandardUncertainty: 0.003,
      diluentMassKg: run.diluentMassKg,
      diluentMaterial: run.diluentMassKg > 0 ? 'SiC' : '',
      particleMinimumM: run.particleMinimumM,
      particleMaximumM: run.particleMaximumM,
      tubeInnerDiameterM: run.tubeInnerDiameterM,
      bedLengthM: run.bedLengthM,
    },
    startedAt: run.startedAt,
    pressurePa: 130_000,
    pressureKind: 'absolute',
    pressureText: '1.30 bar abs',
    feed: demoFeed.map((entry) => ({
      species: entry.species,
      flowText: `${entry.flowMlPerMin} mL/min`,
      flowMolPerS: molarFlowFromVolumeFlow(entry.flowMlPerMin / 6e7, reference),
      referenceTemperatureK: reference.temperatureK,
      referencePressurePa: reference.pressurePa,
      isInternalStandard: entry.isInternalStandard,
    })),
    pretreatment: 'Reduced in 50 % hydrogen at 400 °C for 2 h, cooled in argon.',
  })
}

/**
 * Loads the demo campaign the way people would: every record through the access layer as the person who may make it, every file through the
 * intake. No result is written here; what the screens show is computed from the files.
 */
export async function loadDemoCampaign(
  options: { readonly isWanted?: (code: string) => boolean; readonly say?: (line: string) => void } = {},
): Promise<{ readonly campaignId: string }> {
  const people = await makePeople()
  const researcher = await signedIn(emailOf('researcher'))
  const reaction = await createReaction(researcher, newReactionSchema.parse(demoReaction))
  const admin = await signedIn(emailOf('admin'))
  const rigs = new Map<string, string>()
  for (const rig of demoRigs) rigs.set(rig.code, (await createRig(admin, newRigSchema.parse(rig))).id)

  const founder = await signedIn(emailOf('lead'))
  const campaign = await createCampaign(
    founder,
    newCampaignSchema.parse({
      code: 'CQ-METH-1',
      name: 'Low-temperature CO₂ methanation',
      laboratory: 'Calder Quay Laboratory',
      description: 'Seven catalysts and a blank, compared at 250 °C and feed composition.',
      reactionId: reaction.id,
    }),
  )
  const lead = await signedIn(emailOf('lead'))
  for (const key of ['technician', 'researcher', 'guest'] as const)
    await addMember(lead, campaign.id, { userId: people.get(key) ?? '', role: key })

  const method = await getCurrentMethod(lead, campaign.id)
  await saveMethod(lead, campaign.id, {
    settings: {
      ...method.settings,
      ...demoMethodChange,
      rateOrders: demoMethodChange.rateOrders.map((orders) => ({ ...orders })),
      condensedSpecies: [...demoMethodChange.condensedSpecies],
    },
    reason: 'Integral plug flow with the orders measured in the preceding campaign; argon is the standard',
  })

  const technician = await signedIn(emailOf('technician'))
  const samples = new Map<string, string>()
  for (const { siteDensityMolPerKg, ...sample } of demoSamples) {
    const made = await createSample(technician, newSampleSchema.parse({ ...sample, campaignIds: [campaign.id] }))
    samples.set(sample.code, made.id)
    if (siteDensityMolPerKg !== null)
      await addSiteCount(
        technician,
        made.id,
        newSiteCountSchema.parse({
          method: 'H2 chemisorption',
          molPerKg: siteDensityMolPerKg,
          relativeStandardUncertainty: 0.08,
        }),
      )
  }
  await addDemoCalibration(technician, path.join(FILES, 'response-factors.csv'), '2026-02-01T00:00:00Z')

  for (const run of demoRuns) {
    if (options.isWanted?.(run.code) === false) continue
    const rigId = rigs.get(run.rigCode) ?? ''
    const sampleId = samples.get(run.sampleCode) ?? ''
    const made = await createRun(technician, plannedRun(run, campaign.id, rigId, sampleId))
    for (const file of [run.logFile, run.analyserFile]) await addDemoFile(technician, made.id, path.join(FILES, file))
    if (run.isHandedIn) await handIn(technician, made.id, (await getRun(technician, made.id)).version)
    if (run.decision !== null) await decide(lead, made.id, run.decision, (await getRun(lead, made.id)).version)
    options.say?.(`  ${run.code} on ${run.sampleCode}: ${run.logFile}, ${run.analyserFile}`)
  }
  return { campaignId: campaign.id }
}
