import { z } from 'zod'

const orders = z.record(z.string().min(1).max(20), z.number().min(-3).max(3))

/**
 * What a campaign's method settles. Defaults are written here and nowhere else. Units are in the names; fractions are fractions.
 * A saved method is never changed: another setting is another version with a reason.
 */
export const methodSettingsSchema = z.strictObject({
  rateLaw: z.enum(['differential', 'integral-plug-flow']).default('differential'),
  /** orders in partial pressure, one record a step of the reaction, main step first */
  rateOrders: z.array(orders).max(6).default([]),
  inletSource: z.enum(['bypass', 'controllers']).default('bypass'),
  internalStandard: z.string().max(20).nullable().default(null),
  condensedSpecies: z.array(z.string().max(20)).max(10).default(['H2O']),
  maximumConversion: z.number().gt(0).lte(1).default(0.2),
  carbonBalanceWindow: z.number().gt(0).lt(1).default(0.05),
  graveCarbonBalanceWindow: z.number().gt(0).lt(1).default(0.1),
  holdToleranceK: z.number().gt(0).lte(20).default(1.5),
  minimumHoldS: z.number().gte(60).lte(864_000).default(1_200),
  settlingTimeS: z.number().gte(0).lte(86_400).default(600),
  purgeInjections: z.int().gte(0).lte(20).default(1),
  steadyLimitPerH: z.number().gt(0).lte(1).default(0.01),
  returnedHoldLimit: z.number().gt(0).lte(1).default(0.03),
  referenceTemperatureK: z.number().gt(200).lt(2_000).default(523.15),
  confidenceLevel: z.number().gte(0.5).lte(0.999).default(0.95),
  correctForEquilibrium: z.boolean().default(true),
  rankedBy: z.enum(['turnover-frequency', 'rate']).default('turnover-frequency'),
  /** conversion whose temperature the ranking states */
  targetConversion: z.number().gt(0).lt(1).default(0.02),
  draws: z.int().gte(1_000).lte(200_000).default(20_000),
  seed: z.int().gte(1).lte(2_147_483_647).default(20_260_301),
  /** between-loading relative standard deviation of the rate where replicates do not tell; common practice */
  betweenLoadingRate: z.number().gte(0).lte(1).default(0.03),
  /** between-loading relative standard deviation of the activation energy where replicates do not tell */
  betweenLoadingActivationEnergy: z.number().gte(0).lte(0.2).default(0.005),
  /** standard uncertainties shared by a run's numbers where no calibration record says better */
  flowRelativeStandardUncertainty: z.number().gte(0).lte(0.5).default(0.01),
  responseFactorRelativeStandardUncertainty: z.number().gte(0).lte(0.5).default(0.01),
  temperatureStandardUncertaintyK: z.number().gte(0).lte(20).default(0.5),
})
export type MethodSettings = z.infer<typeof methodSettingsSchema>

export interface Method {
  readonly id: string
  readonly campaignId: string
  readonly number: number
  readonly settings: MethodSettings
  readonly reason: string
  readonly createdBy: string
  readonly createdByName: string
  readonly createdAt: string
}

export const newMethodSchema = z.strictObject({
  settings: methodSettingsSchema,
  reason: z.string().trim().min(3).max(500),
})
export type NewMethod = z.infer<typeof newMethodSchema>
