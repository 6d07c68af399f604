/**
 * A file's name as it may be shown: the last part of a path, composed letters, without control characters and marks that turn the writing
 * round, at most 200 bytes. It is never part of a path here.
 */
export function cleanFileName(name: string): string {
  const last = name.normalize('NFC').split(/[/\\]/).at(-1) ?? ''
  const plain = last
    .replace(/[\u0000-\u001f\u007f-\u009f\u200b-\u200f\u2028-\u202e\u2060-\u2069\ufeff\ud800-\udfff]/gu, '')
    .trim()
  let kept = ''
  let bytes = 0
  for (const letter of plain) {
    bytes += Buffer.byteLength(letter)
    if (bytes > 200) break
    kept += letter
  }
  return kept === '' || kept === '.' || kept === '..' ? 'unnamed' : kept
}
