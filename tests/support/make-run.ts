import type { Database } from '@/db/client'
import { campaigns, loadings, reactions, rigs, runs, samples, uploads, users } from '@/db/schema'

/** The least that a run with one file needs: a person, a reaction, a campaign, a rig, a sample, a loading. Ids begin with `prefix`. */
export async function makeRun(db: Database, prefix = 'a') {
  const ids = {
    userId: `${prefix}-user`,
    reactionId: `${prefix}-reaction`,
    campaignId: `${prefix}-campaign`,
    rigId: `${prefix}-rig`,
    sampleId: `${prefix}-sample`,
    loadingId: `${prefix}-loading`,
    runId: `${prefix}-run`,
    uploadId: `${prefix}-upload`,
  }
  const createdBy = ids.userId
  await db.transaction(async (tx) => {
    await tx.insert(users).values({
      id: ids.userId,
      email: `${prefix}@example.test`,
      displayName: prefix,
      role: 'lead',
      passwordHash: 'none',
      passwordScheme: 'none',
    })
    await tx
      .insert(reactions)
      .values({ id: ids.reactionId, code: prefix, name: prefix, keyReactant: 'CO2', steps: [], createdBy })
    await tx
      .insert(campaigns)
      .values({ id: ids.campaignId, code: prefix, name: prefix, reactionId: ids.reactionId, createdBy })
    await tx.insert(rigs).values({
      id: ids.rigId,
      code: prefix,
      name: prefix,
      reactorKind: 'plug-flow',
      timeZone: 'UTC',
      channels: [{ code: 'A', tubeInnerDiameterM: 0.004 }],
      createdBy,
    })
    await tx.insert(samples).values({ id: ids.sampleId, code: prefix, name: prefix, createdBy })
    await tx.insert(loadings).values({
      id: ids.loadingId,
      code: prefix,
      sampleId: ids.sampleId,
      rigId: ids.rigId,
      channel: 'A',
      catalystMassKg: 1e-4,
      massRelativeStandardUncertainty: 0.001,
      createdBy,
    })
    await tx.insert(runs).values({
      id: ids.runId,
      code: prefix,
      campaignId: ids.campaignId,
      loadingId: ids.loadingId,
      rigId: ids.rigId,
      kind: 'catalyst',
      startedAt: new Date('2026-03-01T08:00:00Z'),
      createdBy,
    })
    await tx.insert(uploads).values({
      id: ids.uploadId,
      campaignId: ids.campaignId,
      runId: ids.runId,
      sha256: '0'.repeat(64),
      byteCount: 1,
      fileName: 'log.csv',
      createdBy,
    })
  })
  return ids
}
