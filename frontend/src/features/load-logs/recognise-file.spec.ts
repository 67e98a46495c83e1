import { describe, expect, it } from 'vitest';
import { recogniseFile } from './recognise-file';

const wide = (columns: number): Blob =>
  new Blob([
    `time${Array.from({ length: columns - 1 }, (_, n) => `,c${n}`).join('')}\n`,
    `2026-06-01T00:00:00Z${',1.5'.repeat(columns - 1)}\n`,
    `2026-06-01T00:00:01Z${',2.5'.repeat(columns - 1)}\n`,
  ]);

describe('recogniseFile', () => {
  it('takes a thousand columns', async () => {
    const { headers } = await recogniseFile(wide(1000));
    expect(headers).toHaveLength(1000);
  });

  it('refuses more, saying where and what mends it, before a form is made of them', async () => {
    await expect(recogniseFile(wide(1001))).rejects.toThrow(
      /^Line 1 has 1001 columns, and at most 1000 can be matched\. Export the time and the load columns only/,
    );
  });
});
