/**
 * Nonce that this document's policy was sent with. After a move between pages inside the browser the server's latest nonce is another one, and
 * styles that carry it would be refused; the scripts of the document still know the first.
 */
export function documentNonce(): string | undefined {
  const nonce = document.querySelector<HTMLScriptElement>('script[nonce]')?.nonce
  return nonce === '' ? undefined : nonce
}
