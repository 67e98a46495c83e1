const LF = 10;
const CR = 13;

/** Where a byte stands in a text table. */
export interface PlaceInText {
  /** Counted from 1. */
  line: number;
  /** Cell of the line, counted from 1. */
  cell: number;
}

/**
 * Finds line and cell of a byte by reading the text once more: a bad file is read twice so that a good one need not
 * have its lines counted.
 *
 * @param chunks the text from its first byte on; when it breaks off earlier, the place is where it ends
 * @param delimiter character between cells
 */
export async function placeInText(
  chunks: AsyncIterable<Uint8Array>,
  byte: number,
  delimiter: string,
): Promise<PlaceInText> {
  const between = delimiter.charCodeAt(0);
  const ends = { [LF]: { lines: 0, cells: 0 }, [CR]: { lines: 0, cells: 0 } };
  let left = byte;
  try {
    for await (const chunk of chunks) {
      const size = Math.min(left, chunk.length);
      for (let i = 0; i < size; i++) {
        const value = chunk[i];
        if (value === LF || value === CR) {
          ends[value].lines++;
          ends[value].cells = 0;
        } else if (value === between) {
          ends[LF].cells++;
          ends[CR].cells++;
        }
      }
      left -= size;
      if (left === 0) break;
    }
  } catch {
    // Broken off where the first reading broke off too: that is the place.
  }
  // Lines end in CR alone only where the text has no LF at all.
  const { lines, cells } = ends[LF].lines > 0 ? ends[LF] : ends[CR];
  return { line: lines + 1, cell: cells + 1 };
}
