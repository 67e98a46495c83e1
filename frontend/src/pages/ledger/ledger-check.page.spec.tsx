import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { ledgerCheckSchema, type LedgerCheckDto } from '@stayledger/shared/contracts/ledger';
import { vesselSchema } from '@stayledger/shared/contracts/vessels';
import { ROLE_PERMISSIONS, type Role } from '@stayledger/shared/permissions/permissions';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, refusal, reply } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleId, sampleSession, sampleVessel } from '../../testing/samples';

const CHECK: LedgerCheckDto = {
  vesselId: sampleId(10),
  vesselName: 'Brightwater',
  checkedAt: '2026-12-01T10:00:00.000Z',
  parts: 4,
  chains: 9,
  entries: 61,
  recomputed: 48,
  reversals: 13,
  differences: [],
  notRecomputed: [],
};

function open(found: Partial<LedgerCheckDto> | 'refused', role: Role = 'surveyor') {
  const api = fakeApi({
    'GET /auth/session': reply(sessionSchema, sampleSession(role)),
    'GET /vessels/:id': reply(vesselSchema, sampleVessel({ permissions: [...ROLE_PERMISSIONS[role]] })),
    'POST /vessels/:id/ledger/check': () =>
      found === 'refused'
        ? refusal(503, 'unavailable', 'The database is away for a moment.')
        : reply(ledgerCheckSchema, { ...CHECK, ...found }),
  });
  return { api, ...renderApp(`/vessels/${sampleId(10)}/ledger-check`) };
}

describe('checking the ledger of a vessel', () => {
  it('checks on a click and says how much was checked', async () => {
    const { user, api } = open({});
    const button = await screen.findByRole('button', { name: 'Check now' });
    expect(api.requests.some(({ method }) => method === 'POST')).toBe(false);
    await user.click(button);
    expect((await screen.findByText('Nothing differs.')).getAttribute('role')).toBe('status');
    const main = screen.getByRole('main').textContent;
    expect(main).toContain('Entries, each hash recomputed61');
    expect(main).toContain('Amounts recomputed from stored spectra48');
    expect(screen.getByRole('button', { name: 'Check again' })).toBeTruthy();
  });

  it('lists what differs, with what was written and what comes out', async () => {
    const { user } = open({
      differences: [
        {
          partId: sampleId(30),
          positionLabel: 'Cap shroud, port',
          detailName: 'lower terminal',
          entryId: sampleId(77),
          sequence: 3,
          kind: 'recorded',
          what: 'The stored spectrum gives another amount.',
          written: 0.0061,
          recomputed: 0.0122,
        },
      ],
    });
    await user.click(await screen.findByRole('button', { name: 'Check now' }));
    expect((await screen.findByRole('alert')).textContent).toContain('One thing differs.');
    const table = screen.getByRole('table', { name: 'What differs' });
    const row = within(table).getAllByRole('row')[1].textContent;
    expect(row).toContain('lower terminal, recorded, number 3');
    expect(row).toContain('The stored spectrum gives another amount.');
    expect(within(table).getByRole('link', { name: 'Cap shroud, port' }).getAttribute('href')).toBe(
      `/parts/${sampleId(30)}`,
    );
    expect(screen.queryByText('Nothing differs.')).toBeNull();
  });

  it('does not say that nothing differs where there was nothing to check', async () => {
    const { user } = open({ entries: 0, recomputed: 0, reversals: 0 });
    await user.click(await screen.findByRole('button', { name: 'Check now' }));
    expect(await screen.findByText(/nothing to check yet/)).toBeTruthy();
    expect(screen.queryByText('Nothing differs.')).toBeNull();
  });

  it('says when it could not be checked', async () => {
    const { user } = open('refused');
    await user.click(await screen.findByRole('button', { name: 'Check now' }));
    expect((await screen.findByRole('alert')).textContent).toContain('The database is away');
  });

  it('offers no button to an owner', async () => {
    open({}, 'owner');
    expect(await screen.findByText(/A surveyor or rigger who looks after this vessel/)).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Check now' })).toBeNull();
  });
});
