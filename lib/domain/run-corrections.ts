import { canonicalJson } from './canonical-json'
import { type LoadingChange, loadingChangeSchema, type NewRun, type RunChange, runChangeSchema } from './run'

export interface RunCorrections {
  readonly run: RunChange
  readonly bed: LoadingChange
}

/**
 * What a person changed in the form of a run: the fields that read otherwise than the form did when it opened. A field that was left alone is no
 * change, though its text holds fewer digits than the record. Of a record that the form
 * cannot say (null) every field is one.
 */
export function correctionsOf(opened: NewRun | null, typed: NewRun): RunCorrections {
  const bedOf = (run: NewRun | null) => (run === null || 'loadingId' in run.loading ? {} : run.loading)
  return {
    run: runChangeSchema.parse(differing(opened ?? {}, typed, Object.keys(runChangeSchema.shape))),
    bed: loadingChangeSchema.parse(differing(bedOf(opened), bedOf(typed), Object.keys(loadingChangeSchema.shape))),
  }
}

function differing(before: object, after: object, names: readonly string[]): Record<string, unknown> {
  const [known, wanted] = [new Map(Object.entries(before)), new Map(Object.entries(after))]
  return Object.fromEntries(
    names.flatMap((name) =>
      wanted.has(name) && canonicalJson(wanted.get(name)) !== canonicalJson(known.get(name) ?? null)
        ? [[name, wanted.get(name)]]
        : [],
    ),
  )
}
