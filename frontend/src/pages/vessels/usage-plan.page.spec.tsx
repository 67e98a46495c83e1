import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { stateUsagePlanSchema, usagePlanReplySchema } from '@stayledger/shared/contracts/life';
import { loadBasesSchema, rigSchema } from '@stayledger/shared/contracts/rig';
import { vesselSchema } from '@stayledger/shared/contracts/vessels';
import { screen, waitFor } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, refusal, reply, type FakeRequest } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleId, sampleSession, sampleVessel } from '../../testing/samples';
// Loaded here, so that the time antd takes to load is not taken for time the page takes.
import '../../app/antd-scope';
import './usage-plan.page';

const PATH = `/vessels/${sampleId(10)}/usage-plan`;

/** A server that keeps one plan and refuses an update of another version than its own. */
function plans(stored: { sailingHoursPerYear: number; version: number } | null) {
  let kept = stored;
  const dto = () =>
    kept && { ...kept, note: '', statedByName: 'Maren Tveit', updatedAt: '2026-04-01T08:00:00.000Z' };
  const api = fakeApi(
    {
      'GET /auth/session': reply(sessionSchema, sampleSession('rigger')),
      'GET /vessels/:vesselId': reply(vesselSchema, sampleVessel()),
      'GET /vessels/:vesselId/rig': reply(rigSchema, { items: [] }),
      'GET /vessels/:vesselId/rig/geometry': refusal(503, 'unavailable', 'Not now.'),
      'GET /vessels/:vesselId/load-bases': reply(loadBasesSchema, { items: [] }),
      'GET /vessels/:vesselId/usage-plan': () => reply(usagePlanReplySchema, { plan: dto() }),
      'PUT /vessels/:vesselId/usage-plan': ({ body }: FakeRequest) => {
        const input = stateUsagePlanSchema.parse(body);
        if (kept && input.version !== kept.version) {
          return refusal(409, 'version-conflict', 'Somebody changed the plan meanwhile.', { current: dto() });
        }
        kept = { sailingHoursPerYear: input.sailingHoursPerYear, version: (kept?.version ?? 0) + 1 };
        return reply(usagePlanReplySchema, {
          plan: {
            ...kept,
            note: input.note,
            statedByName: 'Ailsa Renwick',
            updatedAt: '2026-05-01T08:00:00.000Z',
          },
        });
      },
    },
    { 'PUT /vessels/:vesselId/usage-plan': stateUsagePlanSchema },
  );
  return { ...api, changeElsewhere: (plan: NonNullable<typeof kept>) => (kept = plan) };
}

describe('stating the planned sailing', () => {
  it('states the first plan without a version and goes back to the vessel', async () => {
    const { requests } = plans(null);
    const { user, router } = renderApp(PATH);
    await user.type(await screen.findByLabelText('Hours under sail in a year'), '420,5');
    await user.click(screen.getByRole('button', { name: 'State the plan' }));
    await waitFor(() => expect(router.state.location.pathname).toBe(`/vessels/${sampleId(10)}`));
    expect(requests.find(({ method }) => method === 'PUT')?.body).toEqual({
      sailingHoursPerYear: 420.5,
      note: '',
    });
  });

  it('holds the hours to what a year has, in the words of the contract', async () => {
    plans(null);
    const { user } = renderApp(PATH);
    await user.type(await screen.findByLabelText('Hours under sail in a year'), '9000');
    await user.click(screen.getByRole('button', { name: 'State the plan' }));
    expect(await screen.findByText('A year has 8,784 hours at most.')).toBeTruthy();
  });

  it('says when somebody else was faster, keeps what was typed, and shows the stored plan on request', async () => {
    const { changeElsewhere } = plans({ sailingHoursPerYear: 300, version: 1 });
    const { user } = renderApp(PATH);
    const field = await screen.findByLabelText<HTMLInputElement>('Hours under sail in a year');
    expect(field.value).toBe('300');
    changeElsewhere({ sailingHoursPerYear: 800, version: 2 });
    await user.clear(field);
    await user.type(field, '500');
    await user.click(screen.getByRole('button', { name: 'State the plan' }));
    expect((await screen.findByRole('alert')).textContent).toContain('Somebody changed the plan meanwhile.');
    expect(field.value).toBe('500');
    await user.click(screen.getByRole('button', { name: 'Show what is stored now' }));
    await waitFor(() =>
      expect(screen.getByLabelText<HTMLInputElement>('Hours under sail in a year').value).toBe('800'),
    );
  });
});
