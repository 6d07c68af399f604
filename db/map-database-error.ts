import { AppError, appErrorOf } from '@/lib/domain/errors'

interface Sentence {
  readonly code: 'conflict' | 'invalid'
  readonly message: string
  /** the field of the form that is at fault, where there is one */
  readonly field?: string
}

const conflict = (message: string, field?: string): Sentence => ({
  code: 'conflict',
  message,
  ...(field ? { field } : {}),
})
const invalid = (message: string, field?: string): Sentence => ({
  code: 'invalid',
  message,
  ...(field ? { field } : {}),
})

/** Every unique and check constraint that a person can meet, by its name in the schema. */
const sentences: Readonly<Record<string, Sentence>> = {
  users_email_unique: conflict('Somebody with this e-mail address has an account already.', 'email'),
  users_role_check: invalid('The role is one of technician, researcher, lead, guest and admin.', 'role'),
  tokens_secret_hash_unique: conflict('This token exists already; make another one.'),
  one_time_codes_purpose_check: invalid(
    'A one-time code is for the set-up, an invitation or a password reset.',
    'purpose',
  ),
  campaigns_code_unique: conflict('A campaign with this code exists already.', 'code'),
  members_pkey: conflict('This person is a member of the campaign already.', 'userId'),
  members_role_check: invalid('A member is a technician, researcher, lead or guest.', 'role'),
  campaign_samples_pkey: conflict('This sample is in the campaign already.', 'sampleId'),
  campaign_samples_priority_check: invalid('The priority is outside what is allowed.', 'priority'),
  methods_campaign_id_number_unique: conflict(
    'Somebody saved a method at the same moment; look at it and save yours again.',
  ),
  reactions_code_unique: conflict('A reaction with this code exists already.', 'code'),
  rigs_code_unique: conflict('A rig with this code exists already.', 'code'),
  rigs_reactor_kind_check: invalid('The kind of reactor is not one that is known here.', 'reactorKind'),
  column_maps_rig_id_instrument_number_unique: conflict(
    'Somebody saved a column map for this instrument at the same moment; look at it and save yours again.',
  ),
  calibrations_kind_check: invalid('The kind of calibration is not one that is known here.', 'kind'),
  calibrations_validity_check: invalid(
    'A calibration has to be valid from a time before the one it is valid to.',
    'validTo',
  ),
  samples_code_unique: conflict('A sample with this code exists already.', 'code'),
  lots_sample_id_code_unique: conflict('This sample has a lot with this code already.', 'code'),
  loadings_code_unique: conflict('A loading with this code exists already.', 'code'),
  loadings_mass_check: invalid('The masses of a loading cannot be below zero.', 'catalystMass'),
  site_counts_mol_per_kg_check: invalid('A site count is above zero.', 'molPerKg'),
  site_counts_state_check: invalid('Sites are counted on a fresh or a spent sample.', 'state'),
  runs_campaign_id_code_unique: conflict('The campaign has a run with this code already.', 'code'),
  runs_kind_check: invalid('A run is of a catalyst, a blank or a diluent.', 'kind'),
  runs_state_check: invalid('A run is open, handed in or decided.', 'state'),
  runs_decision_check: invalid('A decision goes with a decided run: counts, set aside or repeat.', 'decision'),
  runs_pressure_kind_check: invalid('A pressure is absolute or gauge.', 'pressureKind'),
  feeds_pkey: conflict('A species stands in the feed twice.', 'feed'),
  feeds_flow_check: invalid('A flow in the feed cannot be below zero.', 'feed'),
  exclusions_kind_check: invalid('What is left out is a hold or an injection.', 'kind'),
  decisions_decision_check: invalid('A decision is one of counts, set aside and repeat.', 'decision'),
  uploads_run_id_sha256_unique: conflict('The run has this very file already.', 'file'),
  uploads_state_check: invalid('The file cannot be put in that state.', 'state'),
  uploads_kind_check: invalid('A file is a rig log, an analyser file or an attachment.', 'kind'),
  reading_sets_kind_check: invalid('Readings are a rig log or injections.', 'kind'),
  readings_pkey: conflict('These readings are stored already.'),
  runs_frozen_check: conflict(
    'A published edition holds this run, so nothing of it changes. A lead can withdraw the edition, with a reason; a correction is a new edition.',
  ),
  editions_frozen_check: conflict('A published edition is never changed; a lead can withdraw it, with a reason.'),
  editions_withdrawal_check: invalid('A withdrawal has its time, its person and its reason.', 'reason'),
  edition_runs_pkey: conflict('The edition holds this run already.'),
  editions_campaign_id_number_unique: conflict('Somebody published an edition at the same moment; look at it first.'),
  drafts_pkey: conflict('This draft was saved from another window at the same moment.'),
  preferences_pkey: conflict('This was saved from another window at the same moment.'),
  idempotency_keys_pkey: conflict('The same request is being answered at this moment.'),
}

const UNIQUE = '23505'
const FOREIGN_KEY = '23503'
const CHECK = '23514'
const NOT_NULL = '23502'
const TEXT_NOT_STORABLE = ['22021', '22P05', '22003', '22P02', '22007', '22008']
const FULL = ['53100', '53200']
/** lost races, waits at their limit, a server going down: the same request may work in a moment */
const BUSY = [
  '40001',
  '40P01',
  '55P03',
  '57014',
  '25P03',
  '57P01',
  '57P02',
  '57P03',
  '53300',
  '08006',
  '08003',
  '08001',
]

interface Refusal {
  readonly code: string
  readonly constraint: string | undefined
  readonly table: string | undefined
}

const textIn = (value: object, key: string): string | undefined => {
  const found: unknown = Reflect.get(value, key)
  return typeof found === 'string' ? found : undefined
}

/** The database's own error in the chain of causes. */
function refusalIn(error: unknown): Refusal | null {
  let at = error
  for (let depth = 0; depth < 8 && at instanceof Error; depth++) {
    const code = textIn(at, 'code')
    if (code !== undefined && /^[0-9A-Z]{5}$/.test(code))
      return { code, constraint: textIn(at, 'constraint'), table: textIn(at, 'table') }
    at = at.cause
  }
  return null
}

const words = (name: string) => name.replaceAll('_', ' ')

/** `runs_rig_id_fkey` on `runs` → `rig`. */
function referredTo({ constraint, table }: Refusal): string {
  const prefix = table ? `${table}_` : ''
  const name = constraint ?? ''
  return words((name.startsWith(prefix) ? name.slice(prefix.length) : name).replace(/_(id|key)?_?fkey$/, ''))
}

function sentenceFor(refusal: Refusal): Sentence | null {
  const known = sentences[refusal.constraint ?? '']
  if (known) return known
  switch (refusal.code) {
    case FOREIGN_KEY:
      return conflict(
        `The ${referredTo(refusal)} named here does not exist, or it is still in use and cannot go (${refusal.constraint ?? 'a reference'}).`,
      )
    case UNIQUE:
      return conflict(`This exists already (${refusal.constraint ?? 'a unique value'}).`)
    case CHECK:
      return invalid(`A value is outside what is allowed (${refusal.constraint ?? 'a check'}).`)
    case NOT_NULL:
      return invalid(`A value that is needed is missing in ${words(refusal.table ?? 'the record')}.`)
    default:
      return TEXT_NOT_STORABLE.includes(refusal.code)
        ? invalid('A value cannot be stored: it holds a character or a number the database does not take.')
        : null
  }
}

/** What a refusal by the database means to a person; null when it is a fault of ours, which is logged and not explained. */
export function mapDatabaseError(error: unknown): AppError | null {
  const own = appErrorOf(error)
  if (own) return own
  const refusal = refusalIn(error)
  if (!refusal) return null
  const options = { cause: error }
  if (BUSY.includes(refusal.code))
    return new AppError(
      'busy',
      'The database is busy with something else; try again in a moment.',
      { retryAfterS: 2 },
      options,
    )
  if (FULL.includes(refusal.code))
    return new AppError('storage-full', 'There is no room left to store this. Nothing of it was kept.', {}, options)
  const sentence = sentenceFor(refusal)
  if (!sentence) return null
  const issues = sentence.field ? [{ field: sentence.field, message: sentence.message }] : []
  return new AppError(sentence.code, sentence.message, { issues, constraint: refusal.constraint }, options)
}
