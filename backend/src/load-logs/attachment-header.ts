/**
 * Content-Disposition for a file that is always saved and never shown, whatever people called it: an ASCII name for
 * old clients and the full name beside it (RFC 6266).
 */
export function attachmentHeader(fileName: string): string {
  const plain = fileName.replace(/[^\x20-\x7e]|["\\/%]/g, '_');
  const full = encodeURIComponent(fileName).replace(
    /['()*]/g,
    (char) => `%${char.charCodeAt(0).toString(16)}`,
  );
  return `attachment; filename="${plain}"; filename*=UTF-8''${full}`;
}
