/** The nonce the server wrote into this page; style elements without it are refused. */
export function pageNonce(): string | undefined {
  const nonce = document.querySelector<HTMLMetaElement>('meta[property="csp-nonce"]')?.nonce;
  return nonce && !nonce.startsWith('__') ? nonce : undefined;
}
