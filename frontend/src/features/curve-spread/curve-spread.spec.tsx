import type { CurveSpreadDto } from '@stayledger/shared/contracts/curve-spread';
import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { curveSpreadSchema } from '@stayledger/shared/contracts/curve-spread';
import { detailChoicesSchema } from '@stayledger/shared/contracts/detail-choices';
import { fittedPartSchema } from '@stayledger/shared/contracts/parts';
import { vesselSchema } from '@stayledger/shared/contracts/vessels';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, reply } from '../../testing/fake-api';
import { samplePart } from '../../testing/part-samples';
import { renderApp } from '../../testing/render-app';
import { sampleId, sampleSession, sampleVessel } from '../../testing/samples';

function open(items: CurveSpreadDto['items']) {
  fakeApi({
    'GET /auth/session': reply(sessionSchema, sampleSession('surveyor')),
    'GET /parts/:id': reply(fittedPartSchema, samplePart()),
    'GET /parts/:id/detail-choices': reply(detailChoicesSchema, { partId: sampleId(30), items: [] }),
    'GET /parts/:id/curve-spread': reply(curveSpreadSchema, {
      partId: sampleId(30),
      loggedHours: 41,
      designFatigueFactor: 5,
      items,
    }),
    'GET /vessels/:id': reply(vesselSchema, sampleVessel()),
  });
  renderApp(`/parts/${sampleId(30)}/details`);
}

const ROW = { curveVersion: 1, level: 'unknown', isUsed: false } as const;

describe('strand curves side by side', () => {
  it('shows the spread as a factor and each curve with its level', async () => {
    open([
      { ...ROW, curveId: 'a', curveName: 'Curve A', level: 'fractile-95-75', isUsed: true, allowance: 0.4 },
      { ...ROW, curveId: 'b', curveName: 'Curve B', level: 'mean', allowance: 0.05 },
    ]);
    const table = await screen.findByRole('table', { name: 'Strand curves side by side' });
    expect(screen.getByText(/lie apart by a factor of 8\.0/)).toBeTruthy();
    const [, first, second] = within(table).getAllByRole('row');
    expect(first.textContent).toContain('Curve A (this account)');
    expect(first.textContent).toContain('design curve');
    expect(second.textContent).toContain('mean of the tests');
    // 0.05 / 0.4
    expect(second.textContent).toMatch(/0\.1[23]$/);
  });

  it('says when there is nothing to set side by side', async () => {
    open([]);
    expect(await screen.findByText(/nothing to set side by side/)).toBeTruthy();
  });
});
