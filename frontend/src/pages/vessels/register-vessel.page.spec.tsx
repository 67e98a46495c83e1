import { sessionSchema, type SessionDto } from '@stayledger/shared/contracts/auth';
import { loadBasesSchema, rigSchema } from '@stayledger/shared/contracts/rig';
import { createVesselSchema, vesselPageSchema, vesselSchema } from '@stayledger/shared/contracts/vessels';
import { screen, waitFor } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, refusal, reply, type FakeReply } from '../../testing/fake-api';
import { chooseOption } from '../../testing/choose-option';
import { renderApp } from '../../testing/render-app';
import { sampleId, sampleSession, sampleVessel } from '../../testing/samples';
// Loaded here, so that the time antd takes to load is not taken for time the page takes.
import '../../app/antd-scope';
import './register-vessel.page';

function register(answers: FakeReply[], session: SessionDto = sampleSession('rigger')) {
  return fakeApi(
    {
      'GET /auth/session': reply(sessionSchema, session),
      'GET /vessels': reply(vesselPageSchema, { items: [], nextCursor: null }),
      'POST /vessels': () => answers.shift() ?? refusal(500, 'internal', 'More requests than expected.'),
      'GET /vessels/:vesselId': reply(vesselSchema, sampleVessel()),
      'GET /vessels/:vesselId/rig': reply(rigSchema, { items: [] }),
      'GET /vessels/:vesselId/rig/geometry': refusal(503, 'unavailable', 'Not now.'),
      'GET /vessels/:vesselId/load-bases': reply(loadBasesSchema, { items: [] }),
    },
    { 'POST /vessels': createVesselSchema },
  );
}

const created = () => reply(vesselSchema, sampleVessel(), 201);

describe('registering a vessel', () => {
  it('sends what was written, in metres and numbers, and opens the vessel', async () => {
    const session = sampleSession('rigger');
    if (session.user) session.user.preferences = { ...session.user.preferences, lengthUnit: 'ft' };
    const { requests } = register([created()], session);
    const { user, router } = renderApp('/vessels/new');
    await user.type(await screen.findByLabelText('Name'), '  Brightwater ');
    await chooseOption(user, 'Rig', 'Cutter');
    await user.type(screen.getByLabelText(/Build year/), '2004');
    // A decimal comma: 46,6 ft are 46.6 * 0.3048 = 14.20368 m.
    await user.type(screen.getByLabelText(/Length overall/), '46,6');
    await user.click(screen.getByRole('button', { name: 'Register vessel' }));
    await waitFor(() => expect(router.state.location.pathname).toBe(`/vessels/${sampleId(10)}`));
    const sent = requests.find(({ method }) => method === 'POST');
    expect(sent?.body).toMatchObject({
      name: 'Brightwater',
      rigType: 'cutter',
      useKind: 'private',
      buildYear: 2004,
      homePort: null,
      firmId: sampleId(2),
      zone: 'Pacific/Chatham',
    });
    expect((sent?.body as { lengthM: number }).lengthM).toBeCloseTo(14.20368, 10);
    expect(sent?.headers.get('Idempotency-Key')).toMatch(/^[0-9a-f-]{36}$/);
  });

  it('says at the field what is missing and sends nothing', async () => {
    const { requests } = register([]);
    const { user } = renderApp('/vessels/new');
    await user.click(await screen.findByRole('button', { name: 'Register vessel' }));
    expect(await screen.findByText('Give the vessel a name.')).toBeTruthy();
    expect(screen.getByText('Say how it is rigged.')).toBeTruthy();
    expect(requests.some(({ method }) => method === 'POST')).toBe(false);
    await waitFor(() => expect(screen.getByLabelText('Name')).toBe(document.activeElement));
  });

  it('refuses what is no figure instead of guessing', async () => {
    register([]);
    const { user } = renderApp('/vessels/new');
    await user.type(await screen.findByLabelText(/Length overall/), '12 or so');
    await user.tab();
    expect(await screen.findByText('Write a figure, such as 12.5 or 12,5.')).toBeTruthy();
  });

  it("puts the server's refusals at their fields", async () => {
    register([
      refusal(400, 'invalid-request', 'One field cannot be taken.', {
        fieldErrors: { name: ['A vessel of your firm is already called so.'] },
      }),
    ]);
    const { user } = renderApp('/vessels/new');
    await user.type(await screen.findByLabelText('Name'), 'Brightwater');
    await chooseOption(user, 'Rig', 'Ketch');
    await user.click(screen.getByRole('button', { name: 'Register vessel' }));
    expect(await screen.findByText('A vessel of your firm is already called so.')).toBeTruthy();
    expect(screen.getByLabelText<HTMLInputElement>('Name').value).toBe('Brightwater');
  });

  it('repeats one wish under one key and gives a changed one a new key', async () => {
    const broken = () => refusal(503, 'unavailable', 'Not now.');
    const { requests } = register([broken(), broken(), created()]);
    const { user } = renderApp('/vessels/new');
    await user.type(await screen.findByLabelText('Name'), 'Brightwater');
    await chooseOption(user, 'Rig', 'Ketch');
    const button = screen.getByRole('button', { name: 'Register vessel' });
    const keys = () =>
      requests.filter(({ method }) => method === 'POST').map(({ headers }) => headers.get('Idempotency-Key'));
    await user.click(button);
    expect((await screen.findByRole('alert')).textContent).toContain('Not now.');
    await user.click(button);
    await waitFor(() => expect(keys()).toHaveLength(2));
    await waitFor(() => expect(button).toHaveProperty('disabled', false));
    await user.type(screen.getByLabelText(/Home port/), 'Skarvik');
    await user.click(button);
    await waitFor(() => expect(keys()).toHaveLength(3));
    const [first, second, third] = keys();
    expect(second).toBe(first);
    expect(third).not.toBe(first);
  });
});
