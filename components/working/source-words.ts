const KINDS: Readonly<Record<string, string>> = {
  flow: 'flow controllers',
  mass: 'weighing of the bed',
  calibration: 'response factor',
  sites: 'site count',
  thermocouple: 'thermocouple',
  inlet: 'inlet composition',
  pressure: 'pressure gauge',
  particle: 'particle size',
  thermochemistry: 'thermochemistry',
}

/** Names of shared sources inside a sentence as people call them: `calibration:<id>:CH4` reads `response factor (CH4)`. */
export function withSourceWords(sentence: string): string {
  return sentence.replace(
    /\b([a-z]+):([A-Za-z0-9-]+)(?::([A-Za-z0-9()+-]+))?/g,
    (whole: string, kind: string, id: string, species: string | undefined) => {
      const word = KINDS[kind]
      if (word === undefined) return whole
      // a code such as R-0008 says something to a reader, a record's key does not
      const name = species ?? (/^[0-9a-f]{8}-/.test(id) ? '' : id)
      return name === '' ? word : `${word} (${name})`
    },
  )
}
