import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { ledgerPageSchema, type LedgerEntryDto } from '@stayledger/shared/contracts/ledger';
import { partLifeSchema, type PartLifeDto } from '@stayledger/shared/contracts/life';
import { fittedPartSchema, type FittedPartDto } from '@stayledger/shared/contracts/parts';
import { vesselSchema } from '@stayledger/shared/contracts/vessels';
import { ROLE_PERMISSIONS, type Role } from '@stayledger/shared/permissions/permissions';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, refusal, reply } from '../../testing/fake-api';
import { sampleEntry, sampleLife, samplePart } from '../../testing/part-samples';
import { renderApp } from '../../testing/render-app';
import { sampleId, sampleSession, sampleStanding, sampleVessel } from '../../testing/samples';

interface Given {
  life?: Partial<PartLifeDto>;
  part?: Partial<FittedPartDto>;
  entries?: LedgerEntryDto[];
  role?: Role;
}

function openPart({ life, part, entries = [sampleEntry()], role = 'rigger' }: Given = {}) {
  fakeApi({
    'GET /auth/session': reply(sessionSchema, sampleSession(role)),
    'GET /parts/:id': reply(fittedPartSchema, samplePart(part)),
    'GET /parts/:id/life': reply(partLifeSchema, sampleLife(life)),
    'GET /parts/:id/ledger': reply(ledgerPageSchema, { items: entries, nextCursor: null }),
    'GET /vessels/:id': reply(vesselSchema, sampleVessel({ permissions: [...ROLE_PERMISSIONS[role]] })),
  });
  return renderApp(`/parts/${sampleId(30)}`);
}

/** No-break spaces as plain ones, for comparisons. */
const plain = (text: string | null): string => (text ?? '').replaceAll(/[\u00a0\u202f]/g, ' ');

describe('part page', () => {
  it('says in one sentence how the part stands, with the governing rule beside the date', async () => {
    openPart();
    expect(
      await screen.findByText('Cap shroud, port: two thirds of its fatigue allowance is used.'),
    ).toBeTruthy();
    const page = plain(screen.getByRole('main').textContent);
    expect(page).toContain('Allowance used67 %');
    expect(page).toContain('Remaining lifeabout 2 years');
    expect(page).toContain('Replace byspring 2029');
    expect(page).toContain('Fatigue allowance governs.');
    expect(page).toContain('Its spread is not computed yet.');
  });

  it('puts the worst detail first and names what is not assessed', async () => {
    openPart();
    const table = await screen.findByRole('table', { name: 'Details of this part' });
    const names = within(table)
      .getAllByRole('rowheader')
      .map((cell) => cell.querySelector('strong')?.textContent);
    expect(names).toEqual(['Lower terminal', 'Wire in free length', 'Chainplate']);
    expect(within(table).getByText('not assessed')).toBeTruthy();
    expect(within(table).getByText(/Estimate: Category borrowed/)).toBeTruthy();
  });

  it('leads from a worst day to its place on the trace', async () => {
    openPart();
    const table = await screen.findByRole('table', { name: 'Days that used most' });
    const link = within(table).getByRole('link');
    expect(plain(link.textContent)).toBe('15 Jun 2026');
    expect(link.getAttribute('href')).toBe(`/load-logs/${sampleId(40)}?day=2026-06-15`);
  });

  it('shows entries with their evidence, a reversal as what it takes back', async () => {
    openPart({
      entries: [
        sampleEntry(),
        sampleEntry({
          id: sampleId(61),
          kind: 'reversal',
          allowance: -0.02,
          damage: -0.004,
          loadLogId: null,
          loadLogName: null,
        }),
      ],
    });
    const table = await screen.findByRole('table', { name: 'Entries of this part’s account' });
    expect(within(table).getByRole('link', { name: 'june-passage.csv' })).toBeTruthy();
    expect(plain(within(table).getAllByRole('row')[2].textContent)).toContain('Reversal');
    expect(plain(within(table).getAllByRole('row')[2].textContent)).toContain('−2.0 %');
  });

  it('says what would give a date where there is none', async () => {
    const standing = sampleStanding({
      assessment: 'not-assessed',
      notAssessedReason: 'No load basis.',
      loadBasis: 'none',
      allowanceUsed: null,
      governingDetail: null,
      fatigueReplaceByOn: null,
      calendarReplaceByOn: null,
      replaceByOn: null,
      governingRule: null,
      remainingYears: null,
      due: 'no-date',
    });
    openPart({
      life: {
        standing,
        details: sampleLife().details.filter((detail) => detail.allowanceUsed === null),
        days: [],
        worstDays: [],
        forecast: [],
        working: [],
        cycles: { measureUnit: 'MPa', bins: [], curvePoints: [] },
        wouldGiveDate: ['A load log with a sensor on this part.'],
      },
      part: { standing },
      entries: [],
    });
    expect(await screen.findByText('A load log with a sensor on this part.')).toBeTruthy();
    expect(await screen.findByText(/No entries yet/)).toBeTruthy();
    const page = plain(screen.getByRole('main').textContent);
    expect(page).toContain('Allowance usednot assessedNo load basis.');
    expect(page).toContain('no date');
    expect(page).not.toMatch(/\d %/);
  });

  it('works the shown equations out again and says which one does not agree', async () => {
    const { user } = openPart();
    await user.click(await screen.findByRole('button', { name: 'Work it out again here' }));
    // 1000 · 5.97 / 59.7 = 100 agrees; 0.134 · 5 = 0.67 is not the 0.7 given.
    const said = await screen.findAllByText(/Worked out here/, {}, { timeout: 15_000 });
    expect(plain(said[0].textContent)).toBe('Worked out here: 100.0, the same as above.');
    expect(plain(said[1].textContent)).toContain('0.6700. That is not the figure above');
  });

  it('speaks plainly to an owner and offers nothing an owner may not do', async () => {
    openPart({ role: 'owner' });
    expect(await screen.findByText('The port cap shroud should be replaced by spring 2029.')).toBeTruthy();
    expect(screen.queryByRole('link', { name: 'Edit part' })).toBeNull();
  });

  it('does not tell a foreign part from an absent one', async () => {
    fakeApi({
      'GET /auth/session': reply(sessionSchema, sampleSession('rigger')),
      'GET /parts/:id': refusal(404, 'not-found', 'Not found.'),
      'GET /parts/:id/life': refusal(404, 'not-found', 'Not found.'),
    });
    renderApp(`/parts/${sampleId(99)}`);
    expect(await screen.findByRole('heading', { name: 'Not found' })).toBeTruthy();
    expect(screen.getByText(/It does not exist, or it is not shared with you/)).toBeTruthy();
  });
});
