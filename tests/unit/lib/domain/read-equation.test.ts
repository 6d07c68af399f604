import { describe, expect, test } from 'vitest'
import { readEquation, typedEquation } from '@/lib/domain/read-equation'

describe('an equation as chemists write it', () => {
  test.each([
    { text: 'CO2 + 4 H2 = CH4 + 2 H2O', is: { CO2: -1, H2: -4, CH4: 1, H2O: 2 } },
    { text: 'CO2+4H2->CH4+2H2O', is: { CO2: -1, H2: -4, CH4: 1, H2O: 2 } },
    { text: 'CO + 1/2 O2 → CO2', is: { CO: -1, O2: -0.5, CO2: 1 } },
    { text: 'NH3 = 0,5 N2 + 1.5 H2', is: { NH3: -1, N2: 0.5, H2: 1.5 } },
  ])('$text', ({ text, is }) => {
    const read = readEquation(text)
    expect(read.ok && read.stoichiometry).toEqual(is)
    const again = read.ok ? readEquation(typedEquation(read.stoichiometry)) : read
    expect(again.ok && again.stoichiometry).toEqual(is)
  })

  test.each([
    { text: 'CO2 + 3 H2 = CH4 + 2 H2O', says: '2 H too many on the right' },
    { text: 'CO2 + H2', says: 'needs two sides' },
    { text: 'CO2 + = CH4', says: 'not a number and a formula' },
    { text: 'Foo(2 = Foo', says: 'not a' },
    { text: '0 CO2 = CO', says: 'above zero' },
  ])('$text is refused', ({ text, says }) => {
    const read = readEquation(text)
    expect(read.ok ? '' : read.sentence).toContain(says)
  })
})
