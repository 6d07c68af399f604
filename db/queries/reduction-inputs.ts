import { and, asc, eq, inArray, isNotNull, isNull, lte, or, gt } from 'drizzle-orm'
import { type Executor } from '../executor'
import {
  calibrations,
  campaigns,
  exclusions,
  feeds,
  holdEdits,
  loadings,
  methods,
  reactions,
  rigs,
  runs,
  samples,
  siteCounts,
  uploads,
  users,
} from '../schema'

/** Records that the reduction of one run rests on, as they stand in the tables. */
export interface RunRecords {
  readonly runId: string
  readonly code: string
  readonly kind: string
  readonly state: string
  readonly decision: string | null
  readonly campaignId: string
  readonly rigId: string
  readonly rigCode: string
  readonly startedAt: Date
  readonly pressurePa: number | null
  readonly pressureKind: string
  readonly barometerPa: number | null
  readonly rigBarometerPa: number
  readonly lineLagS: number
  readonly clockOffsetS: number
  readonly loadingId: string
  readonly loadingCode: string
  readonly sampleId: string
  readonly lotId: string | null
  readonly catalystMassKg: number
  readonly massRelativeStandardUncertainty: number
  readonly diluentMassKg: number
  readonly particleMinimumM: number | null
  readonly particleMaximumM: number | null
  readonly tubeInnerDiameterM: number | null
  readonly bedLengthM: number | null
  readonly particleDensityKgPerM3: number | null
  readonly poreFraction: number | null
  readonly tortuosity: number | null
  readonly meanPoreRadiusM: number | null
  readonly bedVoidFraction: number | null
}

/** Records of these runs, in order of their code. The caller has settled who may see them. */
export async function selectRunRecords(db: Executor, runIds: readonly string[]): Promise<RunRecords[]> {
  if (runIds.length === 0) return []
  return db
    .select({
      runId: runs.id,
      code: runs.code,
      kind: runs.kind,
      state: runs.state,
      decision: runs.decision,
      campaignId: runs.campaignId,
      rigId: runs.rigId,
      rigCode: rigs.code,
      startedAt: runs.startedAt,
      pressurePa: runs.pressurePa,
      pressureKind: runs.pressureKind,
      barometerPa: runs.barometerPa,
      rigBarometerPa: rigs.barometerPa,
      lineLagS: rigs.lineLagS,
      clockOffsetS: runs.clockOffsetS,
      loadingId: loadings.id,
      loadingCode: loadings.code,
      sampleId: loadings.sampleId,
      lotId: loadings.lotId,
      catalystMassKg: loadings.catalystMassKg,
      massRelativeStandardUncertainty: loadings.massRelativeStandardUncertainty,
      diluentMassKg: loadings.diluentMassKg,
      particleMinimumM: loadings.particleMinimumM,
      particleMaximumM: loadings.particleMaximumM,
      tubeInnerDiameterM: loadings.tubeInnerDiameterM,
      bedLengthM: loadings.bedLengthM,
      particleDensityKgPerM3: samples.particleDensityKgPerM3,
      poreFraction: samples.poreFraction,
      tortuosity: samples.tortuosity,
      meanPoreRadiusM: samples.meanPoreRadiusM,
      bedVoidFraction: samples.bedVoidFraction,
    })
    .from(runs)
    .innerJoin(loadings, eq(loadings.id, runs.loadingId))
    .innerJoin(samples, eq(samples.id, loadings.sampleId))
    .innerJoin(rigs, eq(rigs.id, runs.rigId))
    .where(inArray(runs.id, [...runIds]))
    .orderBy(asc(runs.code), asc(runs.id))
}

export async function selectCampaignRunIds(db: Executor, campaignId: string): Promise<string[]> {
  const rows = await db
    .select({ id: runs.id })
    .from(runs)
    .where(eq(runs.campaignId, campaignId))
    .orderBy(asc(runs.code), asc(runs.id))
  return rows.map((row) => row.id)
}

export interface CampaignRecords {
  readonly id: string
  readonly code: string
  readonly name: string
  readonly reactionName: string
  readonly keyReactant: string
  readonly steps: unknown
  readonly thermochemistry: unknown
}

export async function selectCampaignRecords(db: Executor, campaignId: string): Promise<CampaignRecords | undefined> {
  const rows = await db
    .select({
      id: campaigns.id,
      code: campaigns.code,
      name: campaigns.name,
      reactionName: reactions.name,
      keyReactant: reactions.keyReactant,
      steps: reactions.steps,
      thermochemistry: reactions.thermochemistry,
    })
    .from(campaigns)
    .innerJoin(reactions, eq(reactions.id, campaigns.reactionId))
    .where(eq(campaigns.id, campaignId))
  return rows[0]
}

export async function selectMethodSettings(
  db: Executor,
  campaignId: string,
): Promise<{ id: string; number: number; settings: unknown }[]> {
  return db
    .select({ id: methods.id, number: methods.number, settings: methods.settings })
    .from(methods)
    .where(eq(methods.campaignId, campaignId))
    .orderBy(asc(methods.number))
}

export interface CalibrationRecord {
  readonly id: string
  readonly kind: string
  readonly name: string
  readonly rigId: string | null
  readonly convention: string | null
  readonly entries: unknown
  readonly validFrom: Date
  readonly validTo: Date | null
  /** what supersedes it, at first or second hand: it gives way where one of them is valid, and only there */
  readonly supersededByIds: readonly string[]
}

/** Calibrations that may hold for a run between these times, newest first. */
export async function selectCalibrationRecords(db: Executor, from: Date, to: Date): Promise<CalibrationRecord[]> {
  const rows = await db
    .select({
      id: calibrations.id,
      kind: calibrations.kind,
      name: calibrations.name,
      rigId: calibrations.rigId,
      convention: calibrations.convention,
      entries: calibrations.entries,
      validFrom: calibrations.validFrom,
      validTo: calibrations.validTo,
    })
    .from(calibrations)
    .where(and(lte(calibrations.validFrom, to), or(isNull(calibrations.validTo), gt(calibrations.validTo, from))))
    .orderBy(asc(calibrations.validFrom), asc(calibrations.createdAt), asc(calibrations.id))
  const links = await db
    .select({ id: calibrations.id, supersedesId: calibrations.supersedesId })
    .from(calibrations)
    .where(isNotNull(calibrations.supersedesId))
    .orderBy(asc(calibrations.id))
  return rows.reverse().map((row) => ({ ...row, supersededByIds: successorsOf(row.id, links) }))
}

function successorsOf(
  id: string,
  links: readonly { readonly id: string; readonly supersedesId: string | null }[],
): string[] {
  const found = [id]
  for (const earlier of found)
    for (const link of links) if (link.supersedesId === earlier && !found.includes(link.id)) found.push(link.id)
  return found.slice(1)
}

export interface SiteCountRecord {
  readonly id: string
  readonly sampleId: string
  readonly lotId: string | null
  readonly method: string
  readonly molPerKg: number
  readonly relativeStandardUncertainty: number
}

/** Site counts of these samples, newest first. */
export async function selectSiteCountRecords(db: Executor, sampleIds: readonly string[]): Promise<SiteCountRecord[]> {
  if (sampleIds.length === 0) return []
  const rows = await db
    .select({
      id: siteCounts.id,
      sampleId: siteCounts.sampleId,
      lotId: siteCounts.lotId,
      method: siteCounts.method,
      molPerKg: siteCounts.molPerKg,
      relativeStandardUncertainty: siteCounts.relativeStandardUncertainty,
    })
    .from(siteCounts)
    .where(inArray(siteCounts.sampleId, [...sampleIds]))
    .orderBy(asc(siteCounts.createdAt), asc(siteCounts.id))
  return rows.reverse()
}

export interface RunDetailRecords {
  readonly feeds: readonly { runId: string; species: string; flowMolPerS: number; isInternalStandard: boolean }[]
  readonly holdEdits: readonly { runId: string; foundStartS: number; startS: number | null; endS: number | null }[]
  readonly exclusions: readonly { runId: string; kind: string; atS: number; reason: string; by: string }[]
  readonly files: readonly { uploadId: string; fileName: string }[]
}

/** Feed, moved windows, left-out points and file names of these runs; withdrawn changes are not in force. */
export async function selectRunDetailRecords(db: Executor, runIds: readonly string[]): Promise<RunDetailRecords> {
  if (runIds.length === 0) return { feeds: [], holdEdits: [], exclusions: [], files: [] }
  const wanted = [...runIds]
  const feedRows = await db
    .select({
      runId: feeds.runId,
      species: feeds.species,
      flowMolPerS: feeds.flowMolPerS,
      isInternalStandard: feeds.isInternalStandard,
    })
    .from(feeds)
    .where(inArray(feeds.runId, wanted))
    .orderBy(asc(feeds.runId), asc(feeds.position))
  const editRows = await db
    .select({
      runId: holdEdits.runId,
      foundStartS: holdEdits.foundStartS,
      startS: holdEdits.startS,
      endS: holdEdits.endS,
    })
    .from(holdEdits)
    .where(and(inArray(holdEdits.runId, wanted), isNull(holdEdits.withdrawnAt)))
    .orderBy(asc(holdEdits.createdAt), asc(holdEdits.id))
  const exclusionRows = await db
    .select({
      runId: exclusions.runId,
      kind: exclusions.kind,
      atS: exclusions.atS,
      reason: exclusions.reason,
      by: users.displayName,
    })
    .from(exclusions)
    .innerJoin(users, eq(users.id, exclusions.createdBy))
    .where(and(inArray(exclusions.runId, wanted), isNull(exclusions.withdrawnAt)))
    .orderBy(asc(exclusions.atS), asc(exclusions.createdAt), asc(exclusions.id))
  const fileRows = await db
    .select({ uploadId: uploads.id, fileName: uploads.fileName })
    .from(uploads)
    .where(inArray(uploads.runId, wanted))
    .orderBy(asc(uploads.createdAt), asc(uploads.id))
  return {
    feeds: feedRows.map((row) => ({ ...row, isInternalStandard: Boolean(row.isInternalStandard) })),
    // of several edits of one window the newest is in force
    holdEdits: [...new Map(editRows.map((row) => [`${row.runId} ${row.foundStartS}`, row])).values()],
    exclusions: exclusionRows,
    files: fileRows,
  }
}
