import { type Species } from '../reduction/run-input'

/** Workplace exposure limits of a gas. */
export interface ExposureLimit {
  /** time-weighted average, mole fraction in the air breathed */
  readonly average: number
  /** short-term limit, null where the list has none */
  readonly shortTerm: number | null
  /** what else to know, a sentence or empty */
  readonly remark: string
}

const ppm = (average: number, shortTerm: number | null = null, remark = ''): ExposureLimit => ({
  average: average / 1e6,
  shortTerm: shortTerm === null ? null : shortTerm / 1e6,
  remark,
})

/** List the limits are from. Other countries and years differ; the safety data sheet on site decides. */
export const EXPOSURE_LIST = 'Ontario, occupational exposure limits for biological or chemical agents (Regulation 833)'

/** Exposure limits of toxic gases of the trade. Source: {@link EXPOSURE_LIST}. */
export const EXPOSURE_LIMITS: Readonly<Record<Species, ExposureLimit>> = {
  CO: ppm(25, null, 'It has no smell.'),
  NH3: ppm(25, 35),
  H2S: ppm(10, 15, 'It dulls the sense of smell, so the nose does not warn.'),
  NO: ppm(25, null, 'It turns to nitrogen dioxide in air.'),
  CH3OH: ppm(200, 250, 'It also goes through the skin.'),
  HCOOH: ppm(5, 10, 'In closed bottles it decomposes to carbon monoxide and dioxide and builds pressure.'),
}

/** Limit of the carbonyl of a metal, and the metals that form one with carbon monoxide. */
export const CARBONYLS: Readonly<Record<string, { readonly formula: string; readonly limit: string }>> = {
  Ni: { formula: 'Ni(CO)₄', limit: '0.05 ppm as nickel' },
  Fe: { formula: 'Fe(CO)₅', limit: '0.1 ppm as iron, 0.2 ppm short-term' },
  Co: { formula: 'Co₂(CO)₈ and HCo(CO)₄', limit: 'as on the safety data sheet' },
  Ru: { formula: 'Ru(CO)₅ and Ru₃(CO)₁₂', limit: 'as on the safety data sheet' },
  Mo: { formula: 'Mo(CO)₆', limit: 'as on the safety data sheet' },
}
