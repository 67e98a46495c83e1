import type { Writable } from 'node:stream';
import type { Analysis } from './analyse-log.js';

/** Characters gathered before they are written. */
const PIECE = 1 << 16;

/**
 * Writes an analysis as one JSON document, in pieces: the counts of a long log without a grid do not fit into one
 * string.
 */
export async function writeAnalysis(analysis: Analysis, output: Writable): Promise<void> {
  let piece = '';
  const write = async (text: string) => {
    piece += text;
    if (piece.length < PIECE) return;
    const full = piece;
    piece = '';
    if (!output.write(full)) await new Promise((resolve) => output.once('drain', resolve));
  };
  await write(`{"rows":${analysis.rows},"channels":[`);
  for (const [index, channel] of analysis.channels.entries()) {
    const { column, samples, turningPoints, closedCycles, residue, counts, details } = channel;
    await write(index > 0 ? ',' : '');
    await write(JSON.stringify({ column, samples, turningPoints, closedCycles }).slice(0, -1));
    await write(',"residue":[');
    for (let i = 0; i < residue.length; i++) await write((i > 0 ? ',' : '') + JSON.stringify(residue[i]));
    await write('],"counts":[');
    for (let i = 0; i < counts.length; i++) {
      const { range, mean, count } = counts[i];
      await write((i > 0 ? ',' : '') + JSON.stringify([range, mean, count]));
    }
    await write(`],"details":${JSON.stringify(details)}}`);
  }
  await write(`],"findings":${JSON.stringify(analysis.findings)}}\n`);
  await new Promise<void>((resolve, reject) => {
    output.write(piece, (error) => (error ? reject(error) : resolve()));
  });
}
