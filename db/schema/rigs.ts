import { sql } from 'drizzle-orm'
import { check, doublePrecision, foreignKey, index, integer, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core'
import { at, createdAt, id, version } from './columns'
import { users } from './people'

export const rigs = pgTable(
  'rigs',
  {
    id: id(),
    code: text('code').notNull(),
    name: text('name').notNull(),
    reactorKind: text('reactor_kind').notNull(),
    /** IANA zone of the clocks on the rig's computers */
    timeZone: text('time_zone').notNull(),
    /** list of { code, tubeInnerDiameterM } */
    channels: jsonb('channels').notNull(),
    barometerPa: doublePrecision('barometer_pa').notNull().default(101325),
    maximumPressurePa: doublePrecision('maximum_pressure_pa'),
    maximumTemperatureK: doublePrecision('maximum_temperature_k'),
    /** gas takes this long from the bed to the analyser's loop */
    lineLagS: doublePrecision('line_lag_s').notNull().default(0),
    flowReferenceTemperatureK: doublePrecision('flow_reference_temperature_k'),
    flowReferencePressurePa: doublePrecision('flow_reference_pressure_pa'),
    notes: text('notes').notNull().default(''),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    unique('rigs_code_unique').on(t.code),
    check('rigs_reactor_kind_check', sql`${t.reactorKind} in ('plug-flow', 'stirred-tank', 'batch')`),
    foreignKey({ name: 'rigs_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
  ],
)

/** Response factors, flow controllers, cylinders, balances, thermocouples: value, uncertainty, standard, who, when, validity. */
export const calibrations = pgTable(
  'calibrations',
  {
    id: id(),
    kind: text('kind').notNull(),
    name: text('name').notNull(),
    instrument: text('instrument').notNull().default(''),
    rigId: text('rig_id'),
    /** response factors: `factor` (amount per area) or `sensitivity` (area per amount), as in the file */
    convention: text('convention'),
    /** list of { species?, value, unit, relativeStandardUncertainty | absoluteStandardUncertainty } */
    entries: jsonb('entries').notNull(),
    standardUsed: text('standard_used').notNull().default(''),
    fileSha256: text('file_sha256'),
    validFrom: at('valid_from').notNull(),
    validTo: at('valid_to'),
    supersedesId: text('supersedes_id'),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
    version: version(),
  },
  (t) => [
    check(
      'calibrations_kind_check',
      sql`${t.kind} in ('response-factors', 'flow-controller', 'cylinder', 'balance', 'thermocouple', 'pressure-gauge')`,
    ),
    check('calibrations_validity_check', sql`${t.validTo} is null or ${t.validTo} > ${t.validFrom}`),
    foreignKey({ name: 'calibrations_rig_id_fkey', columns: [t.rigId], foreignColumns: [rigs.id] }),
    foreignKey({ name: 'calibrations_supersedes_id_fkey', columns: [t.supersedesId], foreignColumns: [t.id] }),
    foreignKey({ name: 'calibrations_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
    index('calibrations_kind_valid_from_index').on(t.kind, t.validFrom),
  ],
)

/** What the columns of one instrument's export mean; numbered per instrument, never changed in place. */
export const columnMaps = pgTable(
  'column_maps',
  {
    id: id(),
    rigId: text('rig_id').notNull(),
    instrument: text('instrument').notNull(),
    number: integer('number').notNull(),
    /** normalised header row: the same instrument's next file is recognised by it */
    fingerprint: text('fingerprint').notNull(),
    specification: jsonb('specification').notNull(),
    sampleFileSha256: text('sample_file_sha256'),
    createdBy: text('created_by').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    unique('column_maps_rig_id_instrument_number_unique').on(t.rigId, t.instrument, t.number),
    foreignKey({ name: 'column_maps_rig_id_fkey', columns: [t.rigId], foreignColumns: [rigs.id] }),
    foreignKey({ name: 'column_maps_created_by_fkey', columns: [t.createdBy], foreignColumns: [users.id] }),
    index('column_maps_fingerprint_index').on(t.fingerprint),
  ],
)
