import fc from 'fast-check'

/** The same cases on every machine: a failure is found where it was made, not in somebody else's change. Longer searches take another seed. */
fc.configureGlobal({ seed: Number(process.env['PROPERTY_SEED'] ?? 20_261_201) })
