/** Text of a stretch of bytes: UTF-8, with bytes that are none taken as Latin-1, as older loggers write. */
export function logText(bytes: Uint8Array, from = 0, to = bytes.length): string {
  let text = '';
  let at = from;
  while (at < to) {
    const byte = bytes[at];
    const size = byte < 0x80 ? 1 : byte >= 0xc2 && byte < 0xe0 ? 2 : byte >= 0xe0 && byte < 0xf0 ? 3 : 4;
    let code = size === 1 ? byte : byte & (0x7f >> size);
    let valid = byte < 0xf5 && !(byte >= 0x80 && byte < 0xc2) && at + size <= to;
    for (let i = 1; valid && i < size; i++) {
      if ((bytes[at + i] & 0xc0) !== 0x80) valid = false;
      code = (code << 6) | (bytes[at + i] & 0x3f);
    }
    if (valid && (size === 1 || code >= 0x80) && code <= 0x10ffff) {
      text += String.fromCodePoint(code);
      at += size;
    } else {
      text += String.fromCharCode(byte);
      at++;
    }
  }
  return text;
}
