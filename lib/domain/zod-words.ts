import { z } from 'zod'
import { type Dimension } from '../analysis/units/dimension'
import { typedQuantity } from './typed-quantity'

/** The dimension that the end of a field's name says its number is in: `catalystMassKg`, `barometerPa`. */
const DIMENSIONS: readonly (readonly [RegExp, Dimension])[] = [
  [/(Fraction|relativeStandardUncertainty|RelativeStandardUncertainty)$/, 'fraction'],
  [/Kg$/, 'mass'],
  [/Pa$/, 'pressure'],
  [/[a-z]M$/, 'length'],
  [/[a-z]K$/, 'temperature'],
  [/[a-z]S$/, 'time'],
]

function limitText(path: readonly PropertyKey[] | undefined, limit: number | bigint): string {
  const name = String(path?.at(-1) ?? '')
  const dimension = DIMENSIONS.find(([pattern]) => pattern.test(name))?.[1]
  return dimension === undefined ? String(limit) : typedQuantity(Number(limit), dimension)
}

const letters = (count: number | bigint) => `${String(count)} ${Number(count) === 1 ? 'character' : 'characters'}`

/** What is wrong with a value, as a person would say it; nothing where the schema has words of its own or the parser's will do. */
function inWords(issue: z.core.$ZodRawIssue): string | undefined {
  const { path } = issue
  switch (issue.code) {
    case 'invalid_type':
      return issue.input === undefined ? 'This is missing.' : `This must be ${article(issue.expected)}.`
    case 'too_big':
      if (issue.origin === 'string') return `This may have at most ${letters(issue.maximum)}.`
      if (issue.origin === 'array') return `At most ${String(issue.maximum)} of these.`
      return `This must be ${issue.inclusive === false ? 'below' : 'at most'} ${limitText(path, issue.maximum)}.`
    case 'too_small':
      if (issue.origin === 'string')
        return Number(issue.minimum) <= 1 ? 'This is missing.' : `This needs at least ${letters(issue.minimum)}.`
      if (issue.origin === 'array') return `At least ${String(issue.minimum)} of these.`
      return `This must be ${issue.inclusive === false ? 'above' : 'at least'} ${limitText(path, issue.minimum)}.`
    case 'invalid_value':
      return `This must be one of: ${issue.values.map(String).join(', ')}.`
    default:
      return undefined
  }
}

function article(expected: string): string {
  const words: Readonly<Record<string, string>> = {
    int: 'a whole number',
    number: 'a number',
    string: 'text',
    boolean: 'true or false',
    array: 'a list',
    object: 'a record',
  }
  return words[expected] ?? expected
}

// once for the process: what the schemas of the domain refuse is said in these words, on screen and in the interface
z.config({ customError: inWords })
