import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { curveSpreadSchema } from '@stayledger/shared/contracts/curve-spread';
import {
  chooseDetailSchema,
  detailChoiceEffectSchema,
  detailChoicesSchema,
  previewDetailChoiceSchema,
  type DetailChoiceEffectDto,
  type DetailWithChoiceDto,
} from '@stayledger/shared/contracts/detail-choices';
import { fittedPartSchema } from '@stayledger/shared/contracts/parts';
import { vesselSchema } from '@stayledger/shared/contracts/vessels';
import { ROLE_PERMISSIONS, type Role } from '@stayledger/shared/permissions/permissions';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, refusal, reply, type FakeReply } from '../../testing/fake-api';
import { samplePart } from '../../testing/part-samples';
import { renderApp } from '../../testing/render-app';
import { sampleId, sampleSession, sampleVessel } from '../../testing/samples';

const TERMINAL: DetailWithChoiceDto = {
  key: 'lower-terminal',
  name: 'lower terminal',
  curve: { id: 'estimate-strand-terminal-112', version: 1, name: 'Swaged terminal, 112' },
  designFatigueFactor: 10,
  explanation: 'Swaged terminal on the metallic area.',
  estimates: ['Category 112 is an estimate.'],
  notAssessedReason: null,
  hasArticulation: true,
  choice: null,
  curves: [
    {
      id: 'en-1993-1-11-150',
      version: 1,
      name: 'Category 150',
      appliesTo: 'spiral strand',
      environment: 'corrosion-protected',
      provenance: 'published, secondary',
    },
  ],
};
const EFFECT: DetailChoiceEffectDto = {
  before: 0.4,
  after: 0.1,
  entriesReversed: 3,
  explanation: 'Assessed on Category 150, as chosen.',
  estimates: [],
};

function open(path: string, given: { role?: Role; item?: DetailWithChoiceDto; put?: FakeReply } = {}) {
  const role = given.role ?? 'rigger';
  const choices = reply(detailChoicesSchema, { partId: sampleId(30), items: [given.item ?? TERMINAL] });
  const api = fakeApi(
    {
      'GET /auth/session': reply(sessionSchema, sampleSession(role)),
      'GET /parts/:id': reply(fittedPartSchema, samplePart()),
      'GET /parts/:id/detail-choices': choices,
      'GET /parts/:id/curve-spread': reply(curveSpreadSchema, {
        partId: sampleId(30),
        loggedHours: 0,
        designFatigueFactor: 5,
        items: [],
      }),
      'GET /vessels/:id': reply(vesselSchema, sampleVessel({ permissions: [...ROLE_PERMISSIONS[role]] })),
      'POST /parts/:id/detail-choices/:key/preview': reply(detailChoiceEffectSchema, EFFECT),
      'PUT /parts/:id/detail-choices/:key': given.put ?? choices,
    },
    {
      'POST /parts/:id/detail-choices/:key/preview': previewDetailChoiceSchema,
      'PUT /parts/:id/detail-choices/:key': chooseDetailSchema,
    },
  );
  const view = renderApp(`/parts/${sampleId(30)}/details${path}`);
  return { ...view, sent: (method: string) => api.requests.filter((one) => one.method === method) };
}

const plain = (text: string | null): string => (text ?? '').replaceAll(/[\u00a0\u202f]/g, ' ');

describe('deciding what a detail stands on', () => {
  it('wants evidence, shows what would change, and keeps it only then', async () => {
    const { user, sent } = open('/lower-terminal');
    await user.selectOptions(await screen.findByLabelText('Curve'), 'en-1993-1-11-150@1');
    await user.selectOptions(screen.getByLabelText('How the end turns'), 'both-planes');
    await user.selectOptions(screen.getByLabelText('Design fatigue factor'), '3');
    await user.click(screen.getByRole('button', { name: 'Show what it changes' }));
    expect(sent('POST')).toHaveLength(0);
    expect(document.activeElement).toBe(screen.getByLabelText('Evidence'));
    await user.type(screen.getByLabelText('Evidence'), 'Opened in May');
    await user.click(screen.getByRole('button', { name: 'Show what it changes' }));
    const effect = plain((await screen.findByText(/Allowance used of the lower terminal/)).textContent);
    expect(effect).toBe('Allowance used of the lower terminal: 40 % now, 10 % with this choice.');
    expect(screen.getByText(/3 entries are reversed by further entries/)).toBeTruthy();
    expect(sent('PUT')).toHaveLength(0);
    await user.click(screen.getByRole('button', { name: 'Confirm with this evidence' }));
    expect(await screen.findByRole('heading', { name: 'What each detail stands on' })).toBeTruthy();
    expect(sent('PUT')[0].body).toEqual({
      curve: { id: 'en-1993-1-11-150', version: 1 },
      articulation: 'both-planes',
      designFatigueFactor: 3,
      evidence: 'Opened in May',
    });
  });

  it('has another choice looked at again before it is kept', async () => {
    const { user } = open('/lower-terminal');
    await user.type(await screen.findByLabelText('Evidence'), 'Seen');
    await user.click(screen.getByRole('button', { name: 'Show what it changes' }));
    await screen.findByRole('button', { name: 'Confirm with this evidence' });
    await user.selectOptions(screen.getByLabelText('Design fatigue factor'), '5');
    expect(screen.queryByRole('button', { name: 'Confirm with this evidence' })).toBeNull();
    expect(screen.getByRole('button', { name: 'Show what it changes' })).toBeTruthy();
  });

  it('sends the version it was opened with and says when somebody was faster', async () => {
    const choice = {
      curve: null,
      articulation: null,
      designFatigueFactor: 5,
      evidence: 'Seen',
      confirmedByName: 'Ailsa Renwick',
      confirmedAt: '2026-06-16T09:30:00.000Z',
      version: 4,
    };
    const { user, sent } = open('/lower-terminal', {
      item: { ...TERMINAL, choice },
      put: refusal(409, 'version-conflict', 'Somebody changed this meanwhile.'),
    });
    await user.click(await screen.findByRole('button', { name: 'Show what it changes' }));
    await user.click(await screen.findByRole('button', { name: 'Confirm with this evidence' }));
    expect((await screen.findByRole('alert')).textContent).toContain('Somebody changed this meanwhile.');
    expect(sent('PUT')[0].body).toMatchObject({ version: 4, designFatigueFactor: 5, evidence: 'Seen' });
  });

  it('shows who confirmed what, and offers an owner no change', async () => {
    open('', { role: 'owner' });
    const table = await screen.findByRole('table', { name: 'Details and what they stand on' });
    expect(within(table).getByText('nobody yet')).toBeTruthy();
    expect(within(table).getByText(/Estimate: Category 112/)).toBeTruthy();
    expect(within(table).queryByRole('link', { name: /Change/ })).toBeNull();
  });
});
