/** What a spreadsheet program takes for the start of a formula, ordinary and full-width, also after blanks. */
const STARTS_FORMULA = /^[\s\u0000-\u0020\u00a0\u3000]*[=+\-@\t\r\n＝＋－＠]/

/** Text that a spreadsheet will show and not compute: a leading apostrophe where the text could be taken for a formula. Numbers never come here. */
export function defuseFormula(text: string): string {
  return STARTS_FORMULA.test(text) ? `'${text}` : text
}
