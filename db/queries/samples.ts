import { and, asc, desc, eq, exists, gt, or, sql, type SQL } from 'drizzle-orm'
import { type Page } from '@/lib/domain/page'
import { type Loading } from '@/lib/domain/run'
import { newSiteCountSchema, type Lot, type Sample, type SiteCount } from '@/lib/domain/sample'
import { type Executor, type Transaction } from '../executor'
import { instantOf, instantOrNull } from '../instant'
import { campaignSamples, loadings, lots, samples, siteCounts } from '../schema'
import { inScope, type Scope } from '../scope'

/** A sample is visible in the campaigns that hold it, and to its maker; `makerId` is null where the maker's right does not count. */
export interface SampleScope {
  readonly campaigns: Scope
  readonly makerId: string | null
}

function sampleInScope(db: Executor, scope: SampleScope): SQL | undefined {
  if (scope.campaigns === 'all') return undefined
  const held = db
    .select({ one: sql`1` })
    .from(campaignSamples)
    .where(and(eq(campaignSamples.sampleId, samples.id), inScope(campaignSamples.campaignId, scope.campaigns)))
  return or(scope.makerId === null ? undefined : eq(samples.createdBy, scope.makerId), exists(held))
}

const sampleColumns = {
  id: samples.id,
  code: samples.code,
  name: samples.name,
  composition: samples.composition,
  activeMetal: samples.activeMetal,
  metalMassFraction: samples.metalMassFraction,
  particleDensityKgPerM3: samples.particleDensityKgPerM3,
  poreFraction: samples.poreFraction,
  tortuosity: samples.tortuosity,
  meanPoreRadiusM: samples.meanPoreRadiusM,
  bedVoidFraction: samples.bedVoidFraction,
  notes: samples.notes,
  version: samples.version,
}

export async function selectSamples(db: Executor, scope: SampleScope, page: Page<string>): Promise<Sample[]> {
  return db
    .select(sampleColumns)
    .from(samples)
    .where(and(sampleInScope(db, scope), page.after === null ? undefined : gt(samples.code, page.after)))
    .orderBy(asc(samples.code))
    .limit(page.limit)
}

export async function selectSample(db: Executor, scope: SampleScope, id: string): Promise<Sample | null> {
  const [row] = await db
    .select(sampleColumns)
    .from(samples)
    .where(and(sampleInScope(db, scope), eq(samples.id, id)))
  return row ?? null
}

/** Ids of the campaigns in scope that hold the sample. */
export async function selectCampaignsOfSample(db: Executor, scope: Scope, sampleId: string): Promise<string[]> {
  const rows = await db
    .select({ campaignId: campaignSamples.campaignId })
    .from(campaignSamples)
    .where(and(inScope(campaignSamples.campaignId, scope), eq(campaignSamples.sampleId, sampleId)))
    .orderBy(asc(campaignSamples.campaignId))
  return rows.map((row) => row.campaignId)
}

export async function selectLots(db: Executor, scope: SampleScope, sampleId: string): Promise<Lot[]> {
  const rows = await db
    .select({ id: lots.id, sampleId: lots.sampleId, code: lots.code, madeAt: lots.madeAt, notes: lots.notes })
    .from(lots)
    .innerJoin(samples, eq(samples.id, lots.sampleId))
    .where(and(sampleInScope(db, scope), eq(lots.sampleId, sampleId)))
    .orderBy(asc(lots.code))
  return rows.map((row) => ({ ...row, madeAt: instantOrNull(row.madeAt) }))
}

/** Latest first. */
export async function selectSiteCounts(db: Executor, scope: SampleScope, sampleId: string): Promise<SiteCount[]> {
  const rows = await db
    .select({
      id: siteCounts.id,
      sampleId: siteCounts.sampleId,
      lotId: siteCounts.lotId,
      method: siteCounts.method,
      molPerKg: siteCounts.molPerKg,
      relativeStandardUncertainty: siteCounts.relativeStandardUncertainty,
      state: siteCounts.state,
      countedAt: siteCounts.countedAt,
      notes: siteCounts.notes,
      createdAt: siteCounts.createdAt,
    })
    .from(siteCounts)
    .innerJoin(samples, eq(samples.id, siteCounts.sampleId))
    .where(and(sampleInScope(db, scope), eq(siteCounts.sampleId, sampleId)))
    .orderBy(desc(siteCounts.createdAt), desc(siteCounts.id))
  return rows.map((row) => ({
    ...row,
    method: newSiteCountSchema.shape.method.parse(row.method),
    state: newSiteCountSchema.shape.state.parse(row.state),
    countedAt: instantOrNull(row.countedAt),
    createdAt: instantOf(row.createdAt),
  }))
}

export const loadingColumns = {
  id: loadings.id,
  code: loadings.code,
  sampleId: loadings.sampleId,
  sampleCode: samples.code,
  lotId: loadings.lotId,
  lotCode: lots.code,
  rigId: loadings.rigId,
  channel: loadings.channel,
  catalystMassKg: loadings.catalystMassKg,
  massRelativeStandardUncertainty: loadings.massRelativeStandardUncertainty,
  diluentMassKg: loadings.diluentMassKg,
  diluentMaterial: loadings.diluentMaterial,
  particleMinimumM: loadings.particleMinimumM,
  particleMaximumM: loadings.particleMaximumM,
  tubeInnerDiameterM: loadings.tubeInnerDiameterM,
  bedLengthM: loadings.bedLengthM,
  packedAt: loadings.packedAt,
  version: loadings.version,
}

export interface LoadingFilter {
  readonly rigId?: string | undefined
  readonly channel?: string | undefined
  readonly sampleId?: string | undefined
}

/** Latest packed first: the first one of a rig's channel is the bed that is in. */
export async function selectLoadings(
  db: Executor,
  scope: SampleScope,
  filter: LoadingFilter,
  page: Page<string>,
): Promise<Loading[]> {
  const rows = await db
    .select(loadingColumns)
    .from(loadings)
    .innerJoin(samples, eq(samples.id, loadings.sampleId))
    .leftJoin(lots, eq(lots.id, loadings.lotId))
    .where(
      and(
        sampleInScope(db, scope),
        filter.rigId === undefined ? undefined : eq(loadings.rigId, filter.rigId),
        filter.channel === undefined ? undefined : eq(loadings.channel, filter.channel),
        filter.sampleId === undefined ? undefined : eq(loadings.sampleId, filter.sampleId),
        page.after === null
          ? undefined
          : sql`(coalesce(${loadings.packedAt}, ${loadings.createdAt}), ${loadings.id}) < (select coalesce(l.packed_at, l.created_at), l.id from loadings l where l.id = ${page.after})`,
      ),
    )
    .orderBy(sql`coalesce(${loadings.packedAt}, ${loadings.createdAt}) desc`, desc(loadings.id))
    .limit(page.limit)
  return rows.map((row) => ({ ...row, packedAt: instantOrNull(row.packedAt) }))
}

export async function selectLoading(db: Executor, scope: SampleScope, id: string): Promise<Loading | null> {
  const [row] = await db
    .select(loadingColumns)
    .from(loadings)
    .innerJoin(samples, eq(samples.id, loadings.sampleId))
    .leftJoin(lots, eq(lots.id, loadings.lotId))
    .where(and(sampleInScope(db, scope), eq(loadings.id, id)))
  return row === undefined ? null : { ...row, packedAt: instantOrNull(row.packedAt) }
}

/** Largest number given out in `L-0001`, …; 0 where there is none. Holds the sequence until the transaction ends. */
export async function lockLargestLoadingNumber(tx: Transaction): Promise<number> {
  await tx.execute(sql`select pg_advisory_xact_lock(hashtext('loadings_code'))`)
  const [row] = await tx
    .select({ largest: sql<number | null>`max(substring(code from '^L-([0-9]{1,9})$')::int)` })
    .from(loadings)
  return row?.largest ?? 0
}
