/** Stored bytes that are no load spectrum: cut, changed or of another version. */
export class SpectrumFormatError extends Error {
  override name = 'SpectrumFormatError';
}
