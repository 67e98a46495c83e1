import { readFileSync } from 'node:fs';
import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { constructionListSchema, constructionsFileSchema } from '@stayledger/shared/contracts/constructions';
import { curveListSchema, curvesFileSchema, listedCurveSchema } from '@stayledger/shared/contracts/curves';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, reply, type FakeRequest } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleSession } from '../../testing/samples';

// The shipped data themselves: every word table of the pages must know every key that stands in them.
const data = (name: string): unknown =>
  JSON.parse(readFileSync(`${import.meta.dirname}/../../../../reference-data/${name}`, 'utf8'));
const { curves } = curvesFileSchema.parse(data('curves.json'));
const { constructions } = constructionsFileSchema.parse(data('constructions.json'));

function reference() {
  fakeApi({
    'GET /auth/session': reply(sessionSchema, sampleSession('insurer')),
    'GET /curves': reply(curveListSchema, { items: curves.map((curve) => ({ ...curve, firm: null })) }),
    'GET /curves/:curveId': ({ path }: FakeRequest) => {
      const curve = curves.find(({ id }) => id === path.split('/')[2]);
      if (!curve) throw new Error(`The spec asks for a curve that is not shipped: ${path}`);
      return reply(listedCurveSchema, { ...curve, firm: null });
    },
    'GET /constructions': reply(constructionListSchema, {
      items: constructions.map((one) => ({ ...one, firm: null })),
    }),
  });
}

describe('the reference data', () => {
  it('are found by words of name, use and source together', async () => {
    reference();
    const { user } = renderApp('/reference');
    await user.click(await screen.findByRole('searchbox', { name: 'Find a curve' }));
    await user.paste('EN 1993-1-11 category 150');
    const table = await screen.findByRole('group', { name: 'Curves' });
    expect(
      within(table)
        .getAllByRole('link')
        .map((link) => link.textContent),
    ).toEqual(['EN 1993-1-11, category 150']);
    expect(screen.getByText(`1 of ${curves.length} curves`)).toBeTruthy();
  });

  it('show a first part of the list and the rest on request', async () => {
    reference();
    const { user } = renderApp('/reference');
    const rows = async () => within(await screen.findByRole('table', { name: 'Curves' })).getAllByRole('row');
    expect(await rows()).toHaveLength(1 + 25);
    await user.click(screen.getByRole('button', { name: `Show all ${curves.length}` }));
    expect(await rows()).toHaveLength(1 + curves.length);
  });

  it('say when nothing matches', async () => {
    reference();
    const { user } = renderApp('/reference');
    await user.click(await screen.findByRole('searchbox', { name: 'Find a curve' }));
    await user.paste('cheese');
    expect(await screen.findByText('No curve matches')).toBeTruthy();
  });

  it('tell of each construction where its figures come from', async () => {
    reference();
    renderApp('/reference');
    for (const { source } of constructions) {
      expect(
        (await screen.findAllByText((_, node) => node?.textContent?.includes(source) ?? false)).length,
      ).toBeGreaterThan(0);
    }
  });

  it('show a curve with its drawing in words, its segments and its source', async () => {
    reference();
    renderApp('/reference/curves/en-1993-1-11-150');
    const curve = curves.find(({ id }) => id === 'en-1993-1-11-150');
    expect(await screen.findByRole('heading', { level: 1, name: curve?.name })).toBeTruthy();
    expect(screen.getByText(curve?.source ?? 'no source')).toBeTruthy();
    expect(screen.getByRole('img', { name: /^Range against cycles to failure/ })).toBeTruthy();
    const segments = screen.getByRole('table', { name: `Segments of ${curve?.name}` });
    expect(within(segments).getAllByRole('row')).toHaveLength(1 + (curve?.segments.length ?? 0));
  });

  it('have words for every measure, level, environment and provenance in use', async () => {
    const { ENVIRONMENT_WORDS, LEVEL_WORDS, MEASURE_WORDS, PROVENANCE_WORDS } =
      await import('../../features/reference/reference-words');
    for (const curve of curves) {
      for (const words of [
        MEASURE_WORDS[curve.measure],
        LEVEL_WORDS[curve.level],
        ENVIRONMENT_WORDS[curve.environment],
        PROVENANCE_WORDS[curve.provenance],
      ]) {
        expect(words, curve.id).toMatch(/\w/);
      }
    }
  });
});
