import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { positionHistorySchema, type PartOfPositionDto } from '@stayledger/shared/contracts/position-history';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, reply } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleId, sampleSession, sampleStanding } from '../../testing/samples';

const PART: PartOfPositionDto = {
  id: sampleId(30),
  constructionName: '1x19 stainless strand',
  kindOfWire: 'strand',
  diameterMm: 10,
  breakingLoadKn: 71.2,
  batch: '',
  fittedOn: null,
  removedOn: null,
  removedReason: null,
  entries: 12,
  standing: sampleStanding(),
};

function open(parts: PartOfPositionDto[]) {
  fakeApi({
    'GET /auth/session': reply(sessionSchema, sampleSession('owner')),
    'GET /positions/:id/history': reply(positionHistorySchema, {
      positionId: sampleId(20),
      vesselId: sampleId(10),
      vesselName: 'Brightwater',
      zone: 'Europe/Oslo',
      label: 'Cap shroud, port',
      alias: 'V1',
      parts,
    }),
  });
  return renderApp(`/positions/${sampleId(20)}/history`);
}

describe('a position through time', () => {
  it('lists the part in place and those before it, each with the way to its account', async () => {
    open([
      PART,
      {
        ...PART,
        id: sampleId(31),
        diameterMm: 8,
        fittedOn: '2014-05-01',
        removedOn: '2020-03-10',
        removedReason: 'broken wire',
        entries: 0,
        standing: sampleStanding({ allowanceUsed: null, loggedHours: 0 }),
      },
    ]);
    const table = await screen.findByRole('table', { name: 'Parts of Cap shroud, port through time' });
    const [, now, before] = within(table).getAllByRole('row');
    expect(now.textContent).toContain('not known');
    expect(now.textContent).toContain('in place');
    expect(before.textContent?.replaceAll(/[\u00a0\u202f]/g, ' ')).toContain('10 Mar 2020');
    expect(before.textContent).toContain('broken wire');
    expect(before.textContent).toContain('not assessed');
    expect(within(before).getByRole('link').getAttribute('href')).toBe(`/parts/${sampleId(31)}`);
  });

  it('says what will stand here where nothing was fitted yet', async () => {
    open([]);
    expect(await screen.findByRole('heading', { name: 'No part yet' })).toBeTruthy();
  });
});
