import { and, eq, sql } from 'drizzle-orm'
import { type LoadingChange, type NewLoading } from '@/lib/domain/run'
import { type NewLot, type NewSample, type NewSiteCount, type SampleChange } from '@/lib/domain/sample'
import { type Transaction } from '../executor'
import { dateOrNull } from '../instant'
import { loadings, lots, samples, siteCounts } from '../schema'

interface Made {
  readonly id: string
  readonly createdBy: string
}

export async function insertSample(tx: Transaction, sample: Omit<NewSample, 'campaignIds'> & Made): Promise<void> {
  await tx.insert(samples).values({
    id: sample.id,
    code: sample.code,
    name: sample.name,
    composition: sample.composition,
    activeMetal: sample.activeMetal,
    metalMassFraction: sample.metalMassFraction,
    particleDensityKgPerM3: sample.particleDensityKgPerM3,
    poreFraction: sample.poreFraction,
    tortuosity: sample.tortuosity,
    meanPoreRadiusM: sample.meanPoreRadiusM,
    bedVoidFraction: sample.bedVoidFraction,
    notes: sample.notes,
    createdBy: sample.createdBy,
  })
}

/** False where it has another version by now. Whether the actor sees the sample, the caller has asked. */
export async function updateSample(
  tx: Transaction,
  id: string,
  version: number,
  change: SampleChange,
): Promise<boolean> {
  const rows = await tx
    .update(samples)
    .set({
      name: change.name,
      composition: change.composition,
      activeMetal: change.activeMetal,
      metalMassFraction: change.metalMassFraction,
      particleDensityKgPerM3: change.particleDensityKgPerM3,
      poreFraction: change.poreFraction,
      tortuosity: change.tortuosity,
      meanPoreRadiusM: change.meanPoreRadiusM,
      bedVoidFraction: change.bedVoidFraction,
      notes: change.notes,
      version: sql`${samples.version} + 1`,
    })
    .where(and(eq(samples.id, id), eq(samples.version, version)))
    .returning({ id: samples.id })
  return rows.length > 0
}

export async function insertLot(tx: Transaction, lot: NewLot & Made & { readonly sampleId: string }): Promise<void> {
  await tx.insert(lots).values({
    id: lot.id,
    sampleId: lot.sampleId,
    code: lot.code,
    madeAt: dateOrNull(lot.madeAt),
    notes: lot.notes,
    createdBy: lot.createdBy,
  })
}

export async function insertSiteCount(
  tx: Transaction,
  count: NewSiteCount & Made & { readonly sampleId: string },
): Promise<void> {
  await tx.insert(siteCounts).values({
    id: count.id,
    sampleId: count.sampleId,
    lotId: count.lotId,
    method: count.method,
    molPerKg: count.molPerKg,
    relativeStandardUncertainty: count.relativeStandardUncertainty,
    state: count.state,
    countedAt: dateOrNull(count.countedAt),
    notes: count.notes,
    createdBy: count.createdBy,
  })
}

export async function insertLoading(
  tx: Transaction,
  loading: NewLoading &
    Made & { readonly code: string; readonly rigId: string; readonly channel: string; readonly packedAt: Date },
): Promise<void> {
  await tx.insert(loadings).values({
    id: loading.id,
    code: loading.code,
    sampleId: loading.sampleId,
    lotId: loading.lotId,
    rigId: loading.rigId,
    channel: loading.channel,
    catalystMassKg: loading.catalystMassKg,
    massRelativeStandardUncertainty: loading.massRelativeStandardUncertainty,
    diluentMassKg: loading.diluentMassKg,
    diluentMaterial: loading.diluentMaterial,
    particleMinimumM: loading.particleMinimumM,
    particleMaximumM: loading.particleMaximumM,
    tubeInnerDiameterM: loading.tubeInnerDiameterM,
    bedLengthM: loading.bedLengthM,
    packedAt: loading.packedAt,
    createdBy: loading.createdBy,
  })
}

/** False where it has another version by now. */
export async function updateLoading(
  tx: Transaction,
  id: string,
  version: number,
  change: LoadingChange,
): Promise<boolean> {
  const rows = await tx
    .update(loadings)
    .set({
      lotId: change.lotId,
      catalystMassKg: change.catalystMassKg,
      massRelativeStandardUncertainty: change.massRelativeStandardUncertainty,
      diluentMassKg: change.diluentMassKg,
      diluentMaterial: change.diluentMaterial,
      particleMinimumM: change.particleMinimumM,
      particleMaximumM: change.particleMaximumM,
      tubeInnerDiameterM: change.tubeInnerDiameterM,
      bedLengthM: change.bedLengthM,
      version: sql`${loadings.version} + 1`,
    })
    .where(and(eq(loadings.id, id), eq(loadings.version, version)))
    .returning({ id: loadings.id })
  return rows.length > 0
}
