export type Delimiter = '\t' | ';' | ',' | '|' | ' '

/**
 * Cells of one record. Quotes count only where they open a cell (RFC 4180, a doubled quote inside stands for one); elsewhere they are inch
 * marks and the like. Returns null when a quoted cell is still open at the end: the record goes on in the next line.
 */
export function splitRecord(record: string, delimiter: Delimiter): string[] | null {
  if (record.indexOf('"') < 0) return delimiter === ' ' ? splitAtSpaces(record) : record.split(delimiter)
  const cells: string[] = []
  const mark = delimiter.charCodeAt(0)
  const isSpaces = delimiter === ' '
  let i = 0
  for (;;) {
    while (
      i < record.length &&
      (record.charCodeAt(i) === 0x20 || (!isSpaces && mark !== 9 && record.charCodeAt(i) === 9))
    )
      i++
    if (isSpaces && i >= record.length) return cells
    if (record.charCodeAt(i) === 0x22) {
      let text = ''
      let from = i + 1
      for (;;) {
        const quote = record.indexOf('"', from)
        if (quote < 0) return null
        text += record.slice(from, quote)
        if (record.charCodeAt(quote + 1) !== 0x22) {
          i = quote + 1
          break
        }
        text += '"'
        from = quote + 2
      }
      const next = record.indexOf(delimiter, i)
      const tail = record.slice(i, next < 0 ? record.length : next)
      cells.push(tail.trim() === '' ? text : text + tail)
      if (next < 0) return cells
      i = next + 1
    } else {
      const next = record.indexOf(delimiter, i)
      cells.push(record.slice(i, next < 0 ? record.length : next))
      if (next < 0) return cells
      i = next + 1
    }
  }
}

function splitAtSpaces(record: string): string[] {
  const cells: string[] = []
  let i = 0
  while (i < record.length) {
    while (record.charCodeAt(i) === 0x20 || record.charCodeAt(i) === 9) i++
    const from = i
    while (i < record.length && record.charCodeAt(i) !== 0x20 && record.charCodeAt(i) !== 9) i++
    if (i > from) cells.push(record.slice(from, i))
  }
  return cells
}
