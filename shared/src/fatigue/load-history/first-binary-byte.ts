/** Of the bytes looked at, this share may be control characters in a text: recorders do print a stray bell or escape. */
const CONTROL_SHARE_MAX = 0.01;

/**
 * Tells a binary file from text by its first bytes.
 *
 * @param head the first bytes, not compressed
 * @returns index of the first byte that no text has: a NUL, or the first of too many control characters; -1 for text
 */
export function firstBinaryByte(head: Uint8Array): number {
  const nul = head.indexOf(0);
  if (nul >= 0) return nul;
  let first = -1;
  let controls = 0;
  for (let i = 0; i < head.length; i++) {
    const byte = head[i];
    // Tab, line feed, vertical tab, form feed and carriage return are part of texts.
    if (byte >= 32 || (byte >= 9 && byte <= 13)) continue;
    if (first < 0) first = i;
    controls++;
  }
  return controls > head.length * CONTROL_SHARE_MAX ? first : -1;
}
