import { LIMITS } from '../../limits'
import { type Archive } from '../open-archive'
import { parseXml } from './parse-xml'
import { Refusal } from '../refusal'
import { builtInFormatKind, formatCodeKind, type NumberFormatKind } from './serial-date'

export interface Sheet {
  readonly name: string
  readonly part: string
  readonly isHidden: boolean
}

export interface WorkbookParts {
  readonly sheets: readonly Sheet[]
  readonly is1904: boolean
  /** kind of each cell style, by its index */
  readonly styles: readonly NumberFormatKind[]
  readonly sharedStrings: readonly string[]
}

/** Sheets, styles and shared strings: what is needed before a sheet can be read. */
export async function readWorkbookParts(archive: Archive): Promise<WorkbookParts> {
  const workbookPart = 'xl/workbook.xml'
  if (!archive.has(workbookPart))
    throw new Refusal({
      code: 'unsupported-format',
      found: 'a packed file without a workbook',
      expected: 'an .xlsx workbook or delimited text',
      sentence: 'The file is packed but is no .xlsx workbook. Unpack it and add the files inside.',
    })
  const targets = await readTargets(archive)
  const listed: { name: string; id: string; isHidden: boolean }[] = []
  let is1904 = false
  await parseXml(await archive.open(workbookPart), {
    open: (name, attributes) => {
      if (name === 'workbookPr') is1904 = isTrue(attributes['date1904'])
      if (name === 'sheet' && listed.length >= LIMITS.workbook.sheets)
        throw new Refusal({
          code: 'too-large',
          found: `more than ${String(LIMITS.workbook.sheets)} sheets`,
          expected: `at most ${String(LIMITS.workbook.sheets)} sheets`,
          sentence: `The workbook has more than ${String(LIMITS.workbook.sheets)} sheets. Save the sheet with the readings as a file of its own and add that.`,
        })
      if (name === 'sheet')
        listed.push({
          name: (attributes['name'] ?? '').slice(0, 100),
          id: attributes['r:id'] ?? idOf(attributes),
          isHidden: (attributes['state'] ?? 'visible') !== 'visible',
        })
    },
  })
  const sheets = listed.flatMap(({ name, id, isHidden }) => {
    const part = targets.get(id)
    // a sheet of charts has another kind of part, and no rows
    if (part === undefined) return []
    if (!archive.has(part))
      throw new Refusal({
        code: 'unreadable',
        found: `no part ${part}`,
        expected: `the part with the rows of sheet “${name}”`,
        sentence: `The workbook lists the sheet “${name}” and does not hold it: the file is damaged. Open it in the spreadsheet program, save it and add it again.`,
      })
    return [{ name, part, isHidden }]
  })
  return {
    sheets,
    is1904,
    styles: archive.has('xl/styles.xml') ? await readStyles(archive) : [],
    sharedStrings: archive.has('xl/sharedStrings.xml') ? await readSharedStrings(archive) : [],
  }
}

function isTrue(text: string | undefined): boolean {
  return text === '1' || text === 'true' || text === 'on'
}

/** The relation's id under whatever prefix the writer chose. */
function idOf(attributes: Readonly<Record<string, string>>): string {
  for (const [name, value] of Object.entries(attributes)) if (name.endsWith(':id')) return value
  return ''
}

async function readTargets(archive: Archive): Promise<Map<string, string>> {
  const targets = new Map<string, string>()
  const part = 'xl/_rels/workbook.xml.rels'
  if (!archive.has(part)) return targets
  await parseXml(await archive.open(part), {
    open: (name, attributes) => {
      if (name !== 'Relationship' || attributes['TargetMode'] === 'External') return
      if (!(attributes['Type'] ?? '').endsWith('/worksheet')) return
      const target = attributes['Target'] ?? ''
      targets.set(
        attributes['Id'] ?? '',
        target.startsWith('/') ? target.slice(1) : `xl/${target.replace(/^\.\//, '')}`,
      )
    },
  })
  return targets
}

async function readStyles(archive: Archive): Promise<NumberFormatKind[]> {
  const custom = new Map<number, NumberFormatKind>()
  const styles: NumberFormatKind[] = []
  let isInside = false
  await parseXml(await archive.open('xl/styles.xml'), {
    open: (name, attributes) => {
      if (name === 'numFmt') custom.set(Number(attributes['numFmtId']), formatCodeKind(attributes['formatCode'] ?? ''))
      else if (name === 'cellXfs') isInside = true
      else if (name === 'xf' && isInside && styles.length < LIMITS.workbook.styles) {
        const id = Number(attributes['numFmtId'] ?? '0')
        styles.push(custom.get(id) ?? builtInFormatKind(id))
      }
    },
    close: (name) => {
      if (name === 'cellXfs') isInside = false
    },
  })
  return styles
}

async function readSharedStrings(archive: Archive): Promise<string[]> {
  const strings: string[] = []
  let characters = 0
  let text = ''
  let isText = false
  let isPhonetic = false
  await parseXml(await archive.open('xl/sharedStrings.xml'), {
    open: (name) => {
      if (name === 'si') text = ''
      else if (name === 'rPh') isPhonetic = true
      else if (name === 't') isText = !isPhonetic
    },
    text: (piece) => {
      if (isText && text.length <= LIMITS.cellLength) text += piece
    },
    close: (name) => {
      if (name === 't') isText = false
      else if (name === 'rPh') isPhonetic = false
      else if (name === 'si') {
        characters += text.length
        strings.push(text)
        if (strings.length > LIMITS.workbook.sharedStrings || characters > LIMITS.workbook.sharedStringCharacters)
          throw new Refusal({
            code: 'too-large',
            found: `more than ${String(strings.length - 1)} different texts`,
            expected: `at most ${String(LIMITS.workbook.sharedStrings)}`,
            sentence:
              'The workbook holds more different texts than any table of readings has. Export the sheet as delimited text.',
          })
      }
    },
  })
  return strings
}
