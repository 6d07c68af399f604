import { NetCDFReader } from 'netcdfjs'
import { Refusal } from '../refusal'

export interface Peak {
  /** empty where the integrator named none */
  readonly name: string
  readonly retentionTime: number | null
  readonly area: number | null
  readonly height: number | null
}

export interface Chromatogram {
  /** ISO 8601, with an offset where the file has one; empty where the file has no stamp */
  readonly injectedAt: string
  /** unit of the retention times; the standard's default is seconds */
  readonly retentionUnit: string
  /** every text attribute of the file as it stands */
  readonly attributes: readonly { readonly key: string; readonly value: string }[]
  readonly peaks: readonly Peak[]
}

/** 9.96921e36 is what the netCDF library leaves where nothing was written (NC_FILL_FLOAT and NC_FILL_DOUBLE, `netcdf.h`). */
const FILL = 9.969209968386869e36
const isFill = (value: number) => !Number.isFinite(value) || Math.abs(value) >= FILL * 0.999_999

/**
 * One chromatogram in netCDF classic format as ASTM E1947 lays it out: the peak table and the time of injection. Variables that a file in the wild
 * leaves out are null in every peak; a file without peaks has an empty table.
 * @throws Refusal when the bytes are no netCDF classic file, or hold no chromatogram
 */
export function readChromatogram(bytes: Uint8Array, fileName: string): Chromatogram {
  let reader: NetCDFReader
  try {
    reader = new NetCDFReader(bytes)
  } catch (cause) {
    throw damaged(fileName, cause)
  }
  const variables = new Map((reader.variables ?? []).map((variable) => [variable.name, variable]))
  if (!variables.has('peak_area') && !variables.has('ordinate_values'))
    throw new Refusal({
      code: 'unsupported-format',
      found: `variables ${[...variables.keys()].slice(0, 8).join(', ') || 'none'}`,
      expected: 'a peak table (peak_name, peak_area) as ASTM E1947 lays it out',
      sentence: `“${fileName}” is a netCDF file without a chromatogram in it: it has neither a peak table nor a trace.`,
    })
  const sizeOf = (name: string): number[] =>
    (variables.get(name)?.dimensions ?? []).map((id) => reader.dimensions?.[id]?.size ?? 0)
  const read = (name: string): unknown[] => {
    const variable = variables.get(name)
    if (variable === undefined) return []
    const count = sizeOf(name).reduce((product, size) => product * size, 1)
    // what the directory claims is held against the bytes that are there, before anything is laid out for it
    if (!(count <= bytes.length))
      throw damaged(fileName, new Error(`${name} would have ${String(count)} values in ${String(bytes.length)} bytes`))
    try {
      return [...reader.getDataVariable(variable)].flat()
    } catch (cause) {
      throw damaged(fileName, cause)
    }
  }
  const numbers = (name: string): (number | null)[] =>
    read(name).map((value) => (typeof value === 'number' && !isFill(value) ? value : null))
  const names = fixedTexts(read('peak_name'), sizeOf('peak_name').at(-1) ?? 0)
  const times = numbers('peak_retention_time')
  const areas = numbers('peak_area')
  const heights = numbers('peak_height')
  const count = Math.max(names.length, times.length, areas.length)
  const attributes = reader.globalAttributes.map(({ name, value }) => ({
    key: name,
    value: cleanText(String(value)),
  }))
  const attribute = (name: string) => attributes.find((one) => one.key === name)?.value ?? ''
  return {
    injectedAt: readStamp(attribute('injection_date_time_stamp')),
    retentionUnit: attribute('retention_unit') || 's',
    attributes,
    peaks: Array.from({ length: count }, (_, index) => ({
      name: names[index] ?? '',
      retentionTime: times[index] ?? null,
      area: areas[index] ?? null,
      height: heights[index] ?? null,
    })),
  }
}

/** Texts of fixed length, one after another, each ended by a zero byte or filled with blanks. The parser gives a zero byte as an empty text. */
function fixedTexts(characters: readonly unknown[], length: number): string[] {
  if (length < 1) return []
  const all = characters.map((one) => (typeof one === 'string' && one !== '' ? one : '\u0000')).join('')
  const texts: string[] = []
  for (let from = 0; from < all.length; from += length) texts.push(cleanText(all.slice(from, from + length)))
  return texts
}

function cleanText(text: string): string {
  const end = text.indexOf('\u0000')
  return (end < 0 ? text : text.slice(0, end)).trim()
}

/** `20260302094700+0000` as `2026-03-02T09:47:00+00:00`; what is written otherwise is left for the reader of dates, as it stands. */
function readStamp(stamp: string): string {
  const parts = /^(\d{4})(\d{2})(\d{2})(\d{2})(\d{2})(\d{2})\s*(?:([+-]\d{2}):?(\d{2}))?$/.exec(stamp)
  if (parts === null) return stamp
  const [, year, month, day, hour, minute, second, zoneHour, zoneMinute] = parts
  const offset = zoneHour === undefined || zoneMinute === undefined ? '' : `${zoneHour}:${zoneMinute}`
  return `${String(year)}-${String(month)}-${String(day)}T${String(hour)}:${String(minute)}:${String(second)}${offset}`
}

function damaged(fileName: string, cause: unknown): Refusal {
  return new Refusal({
    code: 'unreadable',
    found: cause instanceof Error ? cause.message : 'a damaged directory',
    expected: 'a complete netCDF file (classic or 64-bit offset format)',
    sentence: `“${fileName}” is damaged or was cut off while it was copied. Copy it again from the instrument and add it.`,
  })
}
