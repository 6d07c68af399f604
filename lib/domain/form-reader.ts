import { type Dimension } from '../analysis/units/dimension'
import { parseQuantity, type QuantityOptions } from '../analysis/units/parse-quantity'
import { AppError, type FieldIssue } from './errors'
import { instantFromLocal } from './instant-in-zone'

/** Reads the fields of a form one by one and gathers what is wrong, so that all of it is told at once. */
export class FormReader {
  private readonly issues: FieldIssue[] = []

  constructor(private readonly data: FormData) {}

  fault(field: string, message: string): void {
    this.issues.push({ field, message })
  }

  /** As typed; empty when the field is missing. */
  text(field: string): string {
    const value = this.data.get(field)
    return typeof value === 'string' ? value.trim() : ''
  }

  texts(field: string): string[] {
    return this.data.getAll(field).filter((value): value is string => typeof value === 'string')
  }

  /** A text that must be there. */
  required(field: string, ask: string): string {
    const text = this.text(field)
    if (text === '') this.fault(field, ask)
    return text
  }

  orNull(field: string): string | null {
    const text = this.text(field)
    return text === '' ? null : text
  }

  isChecked(field: string): boolean {
    return this.data.has(field)
  }

  choice<Choice extends string>(field: string, choices: readonly Choice[], ask: string): Choice {
    const text = this.text(field)
    const chosen = choices.find((choice) => choice === text) ?? choices[0]
    if (chosen === undefined || chosen !== text) this.fault(field, ask)
    if (chosen === undefined) throw new AppError('invalid', ask)
    return chosen
  }

  /** A quantity in SI, or null for an empty field. */
  quantity(field: string, dimension: Dimension, options: QuantityOptions = {}): number | null {
    const text = this.text(field)
    if (text === '') return null
    const read = parseQuantity(text, dimension, options)
    if (read.ok) return read.valueSi
    this.fault(field, read.sentence)
    return null
  }

  /** A quantity in SI that must be there. */
  requiredQuantity(field: string, dimension: Dimension, ask: string, options: QuantityOptions = {}): number {
    const value = this.quantity(field, dimension, options)
    if (value === null && this.text(field) === '') this.fault(field, ask)
    return value ?? 0
  }

  /** A bare number: counts, orders, ratios. */
  number(field: string, ask: string): number {
    const value = Number(this.text(field).replace(',', '.').replace('−', '-'))
    if (this.text(field) === '' || !Number.isFinite(value)) this.fault(field, ask)
    return Number.isFinite(value) ? value : 0
  }

  /** A pressure that must say gauge or absolute, as an absolute one; null for an empty field. */
  absolutePressure(field: string): number | null {
    const text = this.text(field)
    if (text === '') return null
    const read = parseQuantity(text, 'pressure')
    if (!read.ok) {
      this.fault(field, read.sentence)
      return null
    }
    if (read.pressureKind !== 'absolute') {
      this.fault(field, `Write the absolute pressure, for example ${text.replace(/\s*(g|gauge)$/iu, '')} abs.`)
      return null
    }
    return read.valueSi
  }

  /** A time on the wall clock of a zone; null for an empty field. */
  instant(field: string, timeZone: string): string | null {
    const text = this.text(field)
    if (text === '') return null
    const read = instantFromLocal(/^\d{4}-\d{2}-\d{2}$/.test(text) ? `${text}T00:00` : text, timeZone)
    if (read.ok) return read.instant
    this.fault(field, read.sentence)
    return null
  }

  /** All that is wrong, at once. */
  finish(): void {
    if (this.issues.length > 0)
      throw new AppError(
        'invalid',
        this.issues.length === 1 ? 'Not saved: one field needs a look.' : 'Not saved: some fields need a look.',
        { issues: this.issues },
      )
  }
}
