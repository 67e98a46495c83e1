import { sessionSchema } from '@stayledger/shared/contracts/auth';
import {
  vesselListQuerySchema,
  vesselPageSchema,
  type FleetRowDto,
} from '@stayledger/shared/contracts/vessels';
import { screen, waitFor, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, refusal, reply, type FakeRequest } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleFleetRow, sampleId, sampleSession } from '../../testing/samples';

const overdue = sampleFleetRow({
  id: sampleId(11),
  name: 'Grey Petrel',
  governing: {
    partId: sampleId(31),
    positionLabel: 'Forestay',
    kindOfWire: 'strand',
    assessment: 'not-assessed',
    replaceByOn: '2024-05-03',
    rule: 'calendar',
    allowanceUsed: null,
    due: 'overdue',
  },
  counts: { parts: 9, overdue: 1, due: 0, assessed: 3, notAssessed: 5, calendarOnly: 0, logsWaiting: 1 },
});
const inDate = sampleFleetRow();

/** A fleet that answers by filter, as the server would, and checks that the query keeps its contract. */
function fleet(rows: FleetRowDto[], pageSize = 50) {
  return fakeApi({
    'GET /auth/session': reply(sessionSchema, sampleSession('surveyor')),
    'GET /vessels': ({ query }: FakeRequest) => {
      vesselListQuerySchema.parse(Object.fromEntries(query));
      const wanted = query.get('filter') ?? 'all';
      const words = (query.get('q') ?? '').toLowerCase();
      const found = rows.filter(
        ({ counts, name }) =>
          name.toLowerCase().includes(words) &&
          (wanted === 'all' ||
            (wanted === 'overdue' && counts.overdue > 0) ||
            (wanted === 'due' && counts.due > 0) ||
            (wanted === 'waiting' && counts.logsWaiting > 0)),
      );
      const from = Number(query.get('cursor') ?? 0);
      const next = from + pageSize;
      return reply(vesselPageSchema, {
        items: found.slice(from, next),
        nextCursor: next < found.length ? String(next) : null,
      });
    },
  });
}

describe('the fleet', () => {
  it('puts work due first: what is overdue, then logs that wait', async () => {
    fleet([overdue, inDate]);
    renderApp('/fleet');
    const work = await screen.findByRole('region', { name: 'Work due' });
    const items = within(work).getAllByRole('listitem');
    expect(items.map((item) => item.textContent)).toEqual([
      'Grey Petrel: Forestayoverdue since 3\u00a0May\u00a02024, calendar rule',
      'Grey Petrel: a load logwaiting for review',
    ]);
    expect(within(items[0]).getByRole('link').getAttribute('href')).toBe(`/parts/${sampleId(31)}`);
  });

  it('says when nothing is due', async () => {
    fleet([inDate]);
    renderApp('/fleet');
    expect(await screen.findByText(/Nothing is due within twelve months/)).toBeTruthy();
  });

  it('counts what is not assessed in every row', async () => {
    fleet([overdue]);
    renderApp('/fleet');
    const table = await screen.findByRole('table', { name: 'Vessels' });
    const row = within(table).getByRole('row', { name: /Grey Petrel/ });
    expect(within(row).getByText('9 parts: 1 overdue, 5 not assessed, 3 assessed')).toBeTruthy();
  });

  it('keeps search, filter and order in the address and asks the server for them', async () => {
    const { requests } = fleet([overdue, inDate]);
    const { user, router } = renderApp('/fleet');
    await screen.findByRole('table', { name: 'Vessels' });
    await user.selectOptions(screen.getByLabelText('Show'), 'overdue');
    await user.selectOptions(screen.getByLabelText('Order'), 'name');
    await user.type(screen.getByLabelText('Find a vessel'), 'petrel');
    await waitFor(() => expect(router.state.location.search).toBe('?filter=overdue&sort=name&q=petrel'));
    await waitFor(() =>
      expect(requests.at(-1)?.query.toString()).toBe('q=petrel&sort=name&filter=overdue&limit=50'),
    );
    expect(await screen.findByRole('link', { name: 'Grey Petrel' })).toBeTruthy();
    expect(screen.queryByRole('link', { name: 'Brightwater' })).toBeNull();
  });

  it('opens on what its address says and offers the way back from an empty answer', async () => {
    fleet([inDate]);
    const { user } = renderApp('/fleet?filter=waiting&q=nobody');
    expect(await screen.findByText('No vessel matches')).toBeTruthy();
    expect(screen.getByLabelText<HTMLInputElement>('Find a vessel').value).toBe('nobody');
    await user.click(screen.getByRole('button', { name: 'Show all vessels' }));
    expect(await screen.findByRole('link', { name: 'Brightwater' })).toBeTruthy();
    await waitFor(() => expect(screen.getByLabelText<HTMLInputElement>('Find a vessel').value).toBe(''));
  });

  it('fetches one page after the other by cursor', async () => {
    const rows = Array.from({ length: 5 }, (_, index) =>
      sampleFleetRow({ id: sampleId(100 + index), name: `Vessel ${index}` }),
    );
    fleet(rows, 2);
    const { user } = renderApp('/fleet');
    const names = () => screen.getAllByRole('link', { name: /^Vessel \d$/ }).map((link) => link.textContent);
    const more = await screen.findByRole('button', { name: 'Show more vessels' });
    await user.click(more);
    await waitFor(() => expect(names()).toEqual(['Vessel 0', 'Vessel 1', 'Vessel 2', 'Vessel 3']));
    await user.click(more);
    await waitFor(() => expect(names()).toHaveLength(5));
    expect(screen.queryByRole('button', { name: 'Show more vessels' })).toBeNull();
  });

  it('says what will stand there when there is no vessel, and offers the first step', async () => {
    fleet([]);
    renderApp('/fleet');
    expect(await screen.findByText('No vessels yet')).toBeTruthy();
    for (const link of screen.getAllByRole('link', { name: 'Register a vessel' })) {
      expect(link.getAttribute('href')).toBe('/vessels/new');
    }
  });

  it('says what failed, with the request to look for, and tries again', async () => {
    let broken = true;
    fakeApi({
      'GET /auth/session': reply(sessionSchema, sampleSession('surveyor')),
      'GET /vessels': () =>
        broken
          ? refusal(503, 'unavailable', 'The database is starting. Try again in a minute.')
          : reply(vesselPageSchema, { items: [inDate], nextCursor: null }),
    });
    const { user } = renderApp('/fleet');
    const alerts = await screen.findAllByRole('alert');
    expect(alerts.at(-1)?.textContent).toContain('The database is starting.');
    expect(alerts.at(-1)?.textContent).toContain('Request 0193f1d2-0000-7000-8000-00000000abcd');
    broken = false;
    for (const button of screen.getAllByRole('button', { name: 'Try again' })) await user.click(button);
    expect(await screen.findByRole('link', { name: 'Brightwater' })).toBeTruthy();
  });
});
