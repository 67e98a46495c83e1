import { sessionSchema } from '@stayledger/shared/contracts/auth';
import {
  loadBasesSchema,
  rigSchema,
  type LoadBasesDto,
  type PositionDto,
} from '@stayledger/shared/contracts/rig';
import { vesselSchema } from '@stayledger/shared/contracts/vessels';
import { ROLE_PERMISSIONS, type Role } from '@stayledger/shared/permissions/permissions';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, refusal, reply } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleId, samplePosition, sampleSession, sampleStanding, sampleVessel } from '../../testing/samples';

const PATH = `/vessels/${sampleId(10)}`;

function rig(items: PositionDto[], role: Role = 'rigger', bases: LoadBasesDto['items'] = []) {
  fakeApi({
    'GET /auth/session': reply(sessionSchema, sampleSession(role)),
    'GET /vessels/:vesselId': reply(vesselSchema, sampleVessel({ permissions: [...ROLE_PERMISSIONS[role]] })),
    'GET /vessels/:vesselId/rig': reply(rigSchema, { items }),
    'GET /vessels/:vesselId/rig/geometry': refusal(503, 'unavailable', 'Not now.'),
    'GET /vessels/:vesselId/load-bases': reply(loadBasesSchema, { items: bases }),
  });
}

const positions = [
  samplePosition(),
  samplePosition({
    id: sampleId(21),
    label: 'Backstay',
    alias: null,
    part: {
      id: sampleId(31),
      constructionName: 'Solid rod',
      kindOfWire: 'rod',
      diameterMm: 8.38,
      breakingLoadKn: 80,
      fittedOn: null,
      standing: sampleStanding({
        assessment: 'not-assessed',
        notAssessedReason: 'No load is recorded on it.',
        loadBasis: 'none',
        allowanceUsed: null,
        loggedHours: 0,
        replaceByOn: '2024-05-03',
        governingRule: 'calendar',
        due: 'overdue',
      }),
    },
  }),
  samplePosition({ id: sampleId(22), label: 'Bobstay', alias: null, part: null }),
];

describe('the rig of a vessel', () => {
  it('shows each part with its state, allowance, date, rule and load basis', async () => {
    rig(positions);
    renderApp(PATH);
    const shroud = await screen.findByRole('row', { name: /Cap shroud, port/ });
    expect(within(shroud).getByRole('img').getAttribute('aria-label')).toMatch(/^In date, 67/);
    expect(within(shroud).getByText('spring 2029')).toBeTruthy();
    expect(within(shroud).getByText('fatigue allowance')).toBeTruthy();
    expect(within(shroud).getByText('412 h logged')).toBeTruthy();
    const backstay = screen.getByRole('row', { name: /Backstay/ });
    expect(within(backstay).getByText('Overdue')).toBeTruthy();
    expect(within(backstay).getByText('calendar rule')).toBeTruthy();
    expect(within(backstay).getByText('no load basis')).toBeTruthy();
    expect(within(backstay).getByText('not known')).toBeTruthy();
  });

  it('counts what is overdue, not assessed and empty before any figure', async () => {
    rig(positions);
    renderApp(PATH);
    expect(
      await screen.findByText(
        '3 positions: 1 overdue, 1 assessed from recorded loads, 1 not assessed for fatigue, 1 position empty.',
      ),
    ).toBeTruthy();
  });

  it('offers a part for the empty position and changes for the others, to those who may', async () => {
    rig(positions);
    renderApp(PATH);
    const fit = await screen.findByRole('link', { name: 'Fit a part at Bobstay' });
    expect(fit.getAttribute('href')).toBe(`${PATH}/positions/${sampleId(22)}/fit`);
    expect(screen.getByRole('link', { name: 'Take off the part at Backstay' })).toBeTruthy();
    expect(screen.getByRole('link', { name: 'Add a position' })).toBeTruthy();
  });

  it('offers an owner nothing that the server would refuse', async () => {
    rig(positions, 'owner');
    renderApp(PATH);
    await screen.findByRole('row', { name: /Bobstay/ });
    expect(screen.queryByRole('link', { name: /Fit a part|Take off|Add a position|^Edit/ })).toBeNull();
    expect(screen.getByRole('link', { name: 'Planned sailing' })).toBeTruthy();
  });

  it('explains a header where it stands', async () => {
    rig(positions);
    const { user } = renderApp(PATH);
    const help = await screen.findByRole('button', { name: 'Load basis' });
    expect(screen.queryByRole('note')).toBeNull();
    await user.click(help);
    expect(screen.getByRole('note').textContent).toMatch(/Without a basis fatigue is not assessed/);
    await user.keyboard('{Escape}');
    expect(screen.queryByRole('note')).toBeNull();
  });

  it('says what will stand there when there is no position yet', async () => {
    rig([]);
    renderApp(PATH);
    expect(await screen.findByText('No positions yet')).toBeTruthy();
  });

  it('answers a foreign vessel like one that does not exist', async () => {
    fakeApi({
      'GET /auth/session': reply(sessionSchema, sampleSession('rigger')),
      'GET /vessels/:vesselId': refusal(404, 'not-found', 'No such vessel.'),
    });
    renderApp(PATH);
    const alert = await screen.findByRole('alert');
    expect(alert.textContent).toContain('Not found');
    expect(alert.textContent).not.toContain('Request');
    expect(screen.queryByRole('button', { name: 'Try again' })).toBeNull();
  });

  it('says where loads can come from and what would better it', async () => {
    rig([positions[2]], 'rigger', [
      {
        positionId: sampleId(22),
        basis: 'none',
        throughLabel: null,
        words: 'No sensor reaches it.',
        improve: 'A load pin in its turnbuckle would give it a load basis.',
      },
    ]);
    renderApp(PATH);
    const table = await screen.findByRole('table', { name: /Where the loads/ });
    expect(within(table).getByRole('row', { name: /Bobstay/ }).textContent).toContain('load pin');
  });
});
