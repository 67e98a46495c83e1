import { sessionSchema } from '@stayledger/shared/contracts/auth';
import {
  answerPlanSchema,
  moveScheduleSchema,
  requestPlanSchema,
  rerigScheduleSchema,
  scheduleSettingsSchema,
  undoPlanSchema,
  type RerigScheduleDto,
} from '@stayledger/shared/contracts/rerig-schedules';
import { vesselSchema } from '@stayledger/shared/contracts/vessels';
import { ROLE_PERMISSIONS, type Role } from '@stayledger/shared/permissions/permissions';
import { screen, waitFor, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, reply } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { samplePlan, sampleSchedule } from '../../testing/rerig-samples';
import { sampleId, sampleSession, sampleVessel } from '../../testing/samples';
import './rerig-schedule.page';

const PATH = `/vessels/${sampleId(10)}/rerig-schedule`;

function schedules(stored: RerigScheduleDto, role: Role = 'rigger') {
  const answer = () => reply(rerigScheduleSchema, stored);
  return fakeApi(
    {
      'GET /auth/session': reply(sessionSchema, sampleSession(role)),
      'GET /vessels/:vesselId': reply(
        vesselSchema,
        sampleVessel({ permissions: [...ROLE_PERMISSIONS[role]] }),
      ),
      'GET /vessels/:vesselId/rerig-schedule': answer,
      'POST /vessels/:vesselId/rerig-schedule/plans': answer,
      'PUT /vessels/:vesselId/rerig-schedule/settings': answer,
      'POST /vessels/:vesselId/rerig-schedule/undo': answer,
      'POST /vessels/:vesselId/rerig-schedule/state': answer,
    },
    {
      'POST /vessels/:vesselId/rerig-schedule/plans': requestPlanSchema,
      'PUT /vessels/:vesselId/rerig-schedule/settings': scheduleSettingsSchema,
      'POST /vessels/:vesselId/rerig-schedule/undo': undoPlanSchema,
      'POST /vessels/:vesselId/rerig-schedule/state': moveScheduleSchema,
      'POST /vessels/:vesselId/rerig-schedule/answer': answerPlanSchema,
    },
  );
}

const sent = (requests: { method: string; path: string; body: unknown }[]) =>
  requests.filter(({ method }) => method !== 'GET').map(({ path, body }) => [path.split('/').pop(), body]);

describe('the re-rig schedule tab', () => {
  it('says why each piece of work falls where it does, by when to order, and what waiting costs', async () => {
    schedules(sampleSchedule());
    renderApp(PATH);
    const visit = await screen.findByRole('article', { name: 'Visit of Autumn 2028' });
    expect(visit.textContent).toContain('because the mast is out for Forestay');
    expect(visit.textContent).toContain('waiting would cost EUR\u00a02400 and take the mast out once more');
    expect(visit.textContent).toContain('waiting would run 28 days past a date');
    expect(visit.textContent).toContain('Order by summer\u00a02028');
    expect(screen.getByText(/Estimate by Skerry Rigging/).textContent).toContain('not a quotation');
    expect(screen.getByText(/No date stands for Backstay/)).toBeTruthy();
    expect(screen.getByRole('img', { name: /Autumn 2028 mast out, ashore/ })).toBeTruthy();
    expect(screen.getByText(/Costs EUR/).textContent).toContain(
      'Costs EUR\u00a0500 less than the plan before, with 1 visit fewer',
    );
  });

  it('locks, moves, splits and drops a visit by form, and undoes it', async () => {
    const { requests } = schedules(sampleSchedule());
    const { user } = renderApp(PATH);
    await user.click(await screen.findByText('Change the visit of Autumn 2028'));
    await user.click(screen.getByRole('button', { name: 'Lock' }));
    await user.click(screen.getByRole('button', { name: 'Move the visit' }));
    await user.click(screen.getByLabelText('Forestay'));
    await user.click(screen.getByRole('button', { name: 'Move this work' }));
    await user.click(screen.getByRole('button', { name: 'Drop' }));
    await user.click(screen.getByRole('button', { name: /^Undo/ }));
    await waitFor(() => expect(sent(requests)).toHaveLength(5));
    const change = (body: object) => ['plans', { version: 4, change: body }];
    const move = { fromWindowId: '2028-autumn', toWindowId: '2029-spring' };
    expect(sent(requests)).toEqual([
      change({ change: 'lock', windowId: '2028-autumn' }),
      change({ change: 'move', ...move }),
      change({ change: 'split', ...move, taskIds: ['replace:forestay'] }),
      change({ change: 'drop', windowId: '2028-autumn' }),
      ['undo', { version: 4 }],
    ]);
  });

  it('refuses an absence that ends before it begins, at once', async () => {
    const { requests } = schedules(sampleSchedule());
    const { user } = renderApp(PATH);
    await user.click(await screen.findByText(/when the vessel cannot come/));
    await user.click(screen.getByRole('button', { name: 'Add an absence' }));
    await user.type(screen.getByLabelText('From'), '2028-06-02');
    await user.type(screen.getByLabelText('Until'), '2028-06-01');
    await user.click(screen.getByRole('button', { name: 'Save and plan anew' }));
    expect((await screen.findByRole('alert')).textContent).toContain(
      'Absence 1: This ends before it begins.',
    );
    expect(sent(requests)).toEqual([]);
  });

  it('offers a first plan, and says what kept the last one from being made', async () => {
    const planning = {
      id: sampleId(60),
      kind: 'plan-rerig',
      subjectId: sampleId(61),
      state: 'failed' as const,
      progress: 0,
      attempts: 1,
      error: { code: 'no-window', message: 'The yard has no window for this vessel.' },
      createdAt: '2027-01-05T10:00:00.000Z',
      startedAt: null,
      finishedAt: null,
    };
    schedules(sampleSchedule({ plan: null, planning }));
    renderApp(PATH);
    expect((await screen.findByRole('alert')).textContent).toContain(
      'The yard has no window for this vessel.',
    );
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Plan the re-rig' }).disabled).toBe(false);
  });

  it('puts work past its date first and says that such a plan cannot be accepted', async () => {
    const plan = samplePlan();
    const lateTask = {
      taskId: 'replace:forestay',
      name: 'Forestay',
      dueOn: '2026-02-01',
      doneOn: '2027-03-01',
      lateDays: 393,
      reason: 'no-window-in-time' as const,
      words: 'No window of the yard opens in time.',
    };
    schedules(
      sampleSchedule({ plan: { ...plan, plan: { ...plan.plan, lateDays: 393, lateTasks: [lateTask] } } }),
    );
    renderApp(PATH);
    const late = await screen.findByRole('region', { name: 'Past its date' });
    expect(within(late).getByText(/No window of the yard/)).toBeTruthy();
    expect(late.textContent).toContain('It cannot be accepted');
  });

  it('says when dates moved after the plan was made, and does not let it be proposed', async () => {
    schedules(sampleSchedule({ datesMoved: true }));
    renderApp(PATH);
    await screen.findByText(/worked out again after this plan was made/);
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Propose to the owner' }).disabled).toBe(
      true,
    );
    expect(screen.getByRole<HTMLButtonElement>('button', { name: 'Plan anew' }).disabled).toBe(false);
  });

  it('is read by the owner without a button that plans', async () => {
    schedules(sampleSchedule({ state: 'proposed' }), 'owner');
    renderApp(PATH);
    await screen.findByRole('article', { name: 'Visit of Autumn 2028' });
    const names = screen.getAllByRole('button').map((button) => button.textContent);
    expect(names).not.toContain('Plan anew');
    expect(screen.queryByText(/Change the visit/)).toBeNull();
  });
});
