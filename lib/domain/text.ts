import { z } from 'zod'
import './zod-words'

/** Code of a record as people write it on a label: `CQ-101`, `R-0001`, `Rig B`. */
export const codeSchema = z.string().trim().min(1).max(40)
export const nameSchema = z.string().trim().min(1).max(200)
export const notesSchema = z.string().trim().max(4_000).default('')
export const idSchema = z.string().min(1).max(64)
/** Instant with its offset, for example `2026-03-02T07:30:00+01:00`. */
export const instantSchema = z.iso.datetime({ offset: true })
/** Reason for a change that others rely on. */
export const reasonSchema = z.string().trim().min(3).max(500)
export const speciesSchema = z
  .string()
  .regex(/^[A-Za-z][A-Za-z0-9()+-]{0,19}$/)
  // records are keyed by species; a name that every object answers to would be found in all of them
  .refine((name) => !(name in {}), 'This is not the name of a species.')
