import { strToU8, zipSync } from 'fflate'

const MAIN = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main'
const OFFICE = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships'
const escaped = (text: string) => text.replace(/&/g, '&amp;').replace(/</g, '&lt;')

/** A cell: a number, a text, or the attributes and content of one that is odd. */
export type PackedCell = number | string | { readonly raw: string }
export type PackedSheet = readonly [name: string, rows: readonly (readonly PackedCell[])[]]

function cellOf(cell: PackedCell, reference: string): string {
  if (typeof cell === 'number') return `<c r="${reference}"><v>${cell}</v></c>`
  if (typeof cell === 'string') return `<c r="${reference}" t="inlineStr"><is><t>${escaped(cell)}</t></is></c>`
  return `<c r="${reference}" ${cell.raw}</c>`
}

/** A workbook with these sheets and shared strings, the least that is one; a sheet without rows is listed and its part left out. */
export function packWorkbook(sheets: readonly PackedSheet[], sharedStrings: readonly string[] = []): Uint8Array {
  const part = (index: number) => `xl/worksheets/sheet${index + 1}.xml`
  return zipSync({
    'xl/workbook.xml': strToU8(
      `<workbook xmlns="${MAIN}" xmlns:r="${OFFICE}"><sheets>${sheets.map(([name], index) => `<sheet name="${escaped(name)}" sheetId="${index + 1}" r:id="r${index + 1}"/>`).join('')}</sheets></workbook>`,
    ),
    'xl/_rels/workbook.xml.rels': strToU8(
      `<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships">${sheets.map((_sheet, index) => `<Relationship Id="r${index + 1}" Type="${OFFICE}/worksheet" Target="worksheets/sheet${index + 1}.xml"/>`).join('')}</Relationships>`,
    ),
    ...(sharedStrings.length === 0
      ? {}
      : {
          'xl/sharedStrings.xml': strToU8(
            `<sst xmlns="${MAIN}">${sharedStrings.map((text) => `<si><t>${escaped(text)}</t></si>`).join('')}</sst>`,
          ),
        }),
    ...Object.fromEntries(
      sheets.flatMap(([, rows], index) =>
        rows.length === 0
          ? []
          : [
              [
                part(index),
                strToU8(
                  `<worksheet xmlns="${MAIN}"><sheetData>${rows.map((cells, r) => `<row r="${r + 1}">${cells.map((cell, c) => cellOf(cell, `${String.fromCharCode(65 + c)}${r + 1}`)).join('')}</row>`).join('')}</sheetData></worksheet>`,
                ),
              ],
            ],
      ),
    ),
  })
}
