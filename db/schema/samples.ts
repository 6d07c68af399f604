import { sql } from 'drizzle-orm'
import { check, doublePrecision, foreignKey, index, pgTable, text, unique } from 'drizzle-orm/pg-core'
import { at, createdAt, id, version } from './columns'
import { users } from './people'
import { rigs } from './rigs'

export const samples = pgTable(
  'samples',
  {
    id: id(),
    code: text('code').notNull(),
    name: text('name').notNull(),
    composition: text('composition').notNull().default(''),
    /** element symbol of the active metal, for carbonyl cautions and site counts */
    activeMetal: text('active_metal'),
    metalMassFraction: doublePrecision('metal_mass_fraction'),
    particleDensityKgPerM3: doublePrecision('particle_density_kg_per_m3'),
    poreFraction: doublePrecision('pore_fraction'),
    tortuosity: doublePrecision('tortuosity'),
    meanPoreRadiusM: doublePrecision('mean_pore_radius_m'),
    bedVoidFraction: doublePrecision('bed_void_fraction'),
    notes: text('notes').notNull().default(''),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('samples_code_unique').on(t.code),
    foreignKey({ name: 'samples_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
  ],
)

export const lots = pgTable(
  'lots',
  {
    id: id(),
    sampleId: text('sample_id').notNull(),
    code: text('code').notNull(),
    madeAt: at('made_at'),
    notes: text('notes').notNull().default(''),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    unique('lots_sample_id_code_unique').on(t.sampleId, t.code),
    foreignKey({ name: 'lots_sample_id_fkey', columns: [t.sampleId], foreignColumns: [samples.id] }),
    foreignKey({ name: 'lots_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
  ],
)

export const siteCounts = pgTable(
  'site_counts',
  {
    id: id(),
    sampleId: text('sample_id').notNull(),
    lotId: text('lot_id'),
    method: text('method').notNull(),
    molPerKg: doublePrecision('mol_per_kg').notNull(),
    relativeStandardUncertainty: doublePrecision('relative_standard_uncertainty').notNull(),
    /** fresh or spent: sites change during reaction */
    state: text('state').notNull().default('fresh'),
    countedAt: at('counted_at'),
    notes: text('notes').notNull().default(''),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    check('site_counts_mol_per_kg_check', sql`${t.molPerKg} > 0`),
    check('site_counts_state_check', sql`${t.state} in ('fresh', 'spent')`),
    foreignKey({ name: 'site_counts_sample_id_fkey', columns: [t.sampleId], foreignColumns: [samples.id] }),
    foreignKey({ name: 'site_counts_lot_id_fkey', columns: [t.lotId], foreignColumns: [lots.id] }),
    foreignKey({ name: 'site_counts_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
    index('site_counts_sample_id_index').on(t.sampleId),
  ],
)

/** One packed bed: a sample lot in a tube, weighed once. Two runs on it are not replicates of each other; two loadings are. */
export const loadings = pgTable(
  'loadings',
  {
    id: id(),
    code: text('code').notNull(),
    sampleId: text('sample_id').notNull(),
    lotId: text('lot_id'),
    rigId: text('rig_id').notNull(),
    channel: text('channel').notNull(),
    catalystMassKg: doublePrecision('catalyst_mass_kg').notNull(),
    massRelativeStandardUncertainty: doublePrecision('mass_relative_standard_uncertainty').notNull(),
    diluentMassKg: doublePrecision('diluent_mass_kg').notNull().default(0),
    diluentMaterial: text('diluent_material').notNull().default(''),
    particleMinimumM: doublePrecision('particle_minimum_m'),
    particleMaximumM: doublePrecision('particle_maximum_m'),
    tubeInnerDiameterM: doublePrecision('tube_inner_diameter_m'),
    bedLengthM: doublePrecision('bed_length_m'),
    packedAt: at('packed_at'),
    notes: text('notes').notNull().default(''),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('loadings_code_unique').on(t.code),
    check('loadings_mass_check', sql`${t.catalystMassKg} >= 0 and ${t.diluentMassKg} >= 0`),
    foreignKey({ name: 'loadings_sample_id_fkey', columns: [t.sampleId], foreignColumns: [samples.id] }),
    foreignKey({ name: 'loadings_lot_id_fkey', columns: [t.lotId], foreignColumns: [lots.id] }),
    foreignKey({ name: 'loadings_rig_id_fkey', columns: [t.rigId], foreignColumns: [rigs.id] }),
    foreignKey({ name: 'loadings_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
    index('loadings_rig_id_channel_index').on(t.rigId, t.channel),
  ],
)
