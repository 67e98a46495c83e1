import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { usagePlanReplySchema } from '@stayledger/shared/contracts/life';
import { rigSchema, type PositionDto } from '@stayledger/shared/contracts/rig';
import {
  answerPlanSchema,
  rerigScheduleSchema,
  type RerigScheduleDto,
} from '@stayledger/shared/contracts/rerig-schedules';
import { vesselPageSchema, vesselSchema, type FleetRowDto } from '@stayledger/shared/contracts/vessels';
import { ROLE_PERMISSIONS } from '@stayledger/shared/permissions/permissions';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, reply, type FakeRequest } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleSchedule } from '../../testing/rerig-samples';
import {
  sampleFleetRow,
  sampleId,
  samplePosition,
  sampleSession,
  sampleStanding,
  sampleVessel,
} from '../../testing/samples';

const plan = {
  sailingHoursPerYear: 300,
  note: '',
  statedByName: 'Maren Tveit',
  updatedAt: '2026-04-01T08:00:00.000Z',
  version: 1,
};

function position(
  number: number,
  label: string,
  standing: Parameters<typeof sampleStanding>[0],
): PositionDto {
  const sample = samplePosition({ id: sampleId(number), label });
  return {
    ...sample,
    part: sample.part && { ...sample.part, id: sampleId(number + 100), standing: sampleStanding(standing) },
  };
}

const overdue = position(20, 'Forestay', {
  due: 'overdue',
  replaceByOn: '2024-05-03',
  governingRule: 'calendar',
});
const inDate = position(21, 'Cap shroud, port', {});
const unknown = position(22, 'Backstay', {
  assessment: 'not-assessed',
  notAssessedReason: 'No load is recorded on it.',
  loadBasis: 'none',
  allowanceUsed: null,
  replaceByOn: null,
  governingRule: null,
  due: 'no-date',
});

function owner(
  items: PositionDto[],
  options: { hasPlan?: boolean; rows?: FleetRowDto[]; schedule?: RerigScheduleDto } = {},
) {
  return fakeApi({
    'GET /auth/session': reply(sessionSchema, sampleSession('owner')),
    'GET /vessels': reply(vesselPageSchema, { items: options.rows ?? [sampleFleetRow()], nextCursor: null }),
    'GET /vessels/:vesselId': ({ path }: FakeRequest) => {
      const id = path.split('/')[2];
      const name = options.rows?.find((row) => row.id === id)?.name ?? 'Brightwater';
      return reply(vesselSchema, sampleVessel({ id, name, permissions: [...ROLE_PERMISSIONS.owner] }));
    },
    'GET /vessels/:vesselId/rig': reply(rigSchema, { items }),
    'GET /vessels/:vesselId/rerig-schedule': reply(
      rerigScheduleSchema,
      options.schedule ?? sampleSchedule({ plan: null, version: null }),
    ),
    'GET /vessels/:vesselId/usage-plan': reply(usagePlanReplySchema, {
      plan: options.hasPlan === false ? null : plan,
    }),
    'POST /vessels/:vesselId/rerig-schedule/answer': ({ body }: FakeRequest) => {
      const { answer, question } = answerPlanSchema.parse(body);
      return reply(
        rerigScheduleSchema,
        sampleSchedule(
          answer === 'accept'
            ? { state: 'accepted', version: 5 }
            : { state: 'proposed', version: 5, question },
        ),
      );
    },
  });
}

describe("an owner's page", () => {
  it('says what is due, by when and why, without a percentage', async () => {
    owner([inDate, overdue, unknown]);
    renderApp('/');
    const due = await screen.findByRole('region', { name: 'What is due' });
    expect(within(due).getByText('Forestay: should have been replaced by 3 May 2024.')).toBeTruthy();
    expect(
      within(due).getByText(
        'It has reached the age at which parts of its kind are replaced, whatever they have carried.',
      ),
    ).toBeTruthy();
    expect(within(due).queryByText(/Cap shroud/)).toBeNull();
    expect(document.body.textContent).not.toContain('%');
    for (const mark of screen.getAllByRole('img')) expect(mark.getAttribute('aria-label')).not.toContain('%');
  });

  it('says what is not assessed, and why, as plainly', async () => {
    owner([inDate, unknown]);
    renderApp('/my-vessel');
    const section = await screen.findByRole('region', { name: 'What is not assessed' });
    expect(within(section).getByRole('link', { name: 'Backstay' })).toBeTruthy();
    expect(within(section).getByText('No load is recorded on it.')).toBeTruthy();
  });

  it('names what comes first when nothing is due', async () => {
    owner([inDate]);
    renderApp('/my-vessel');
    const section = await screen.findByRole('region', { name: 'Nothing is due within twelve months' });
    expect(within(section).getByText('Cap shroud, port: replace by spring 2029.')).toBeTruthy();
    expect(within(section).getByText(/have used about two thirds of what it was allowed/)).toBeTruthy();
  });

  it('asks for the planned sailing first, since dates hang on it', async () => {
    owner([inDate], { hasPlan: false });
    renderApp('/my-vessel');
    const step = await screen.findByRole('link', { name: 'Say how much you will sail' });
    expect(step.getAttribute('href')).toBe(`/vessels/${sampleId(10)}/usage-plan`);
  });

  it('carries the cautions', async () => {
    owner([inDate]);
    renderApp('/my-vessel');
    const cautions = await screen.findByRole('region', { name: 'What this cannot tell' });
    expect(cautions.textContent).toContain('It never replaces inspection by a competent person.');
  });

  it('lets an owner of two vessels choose, and keeps the choice in the address', async () => {
    const rows = [sampleFleetRow(), sampleFleetRow({ id: sampleId(11), name: 'Grey Petrel' })];
    owner([inDate], { rows });
    const { user, router } = renderApp('/my-vessel');
    await screen.findByRole('heading', { name: 'Brightwater' });
    await user.selectOptions(screen.getByLabelText('Vessel'), 'Grey Petrel');
    expect(await screen.findByRole('heading', { name: 'Grey Petrel' })).toBeTruthy();
    expect(router.state.location.search).toBe(`?vessel=${sampleId(11)}`);
  });

  it('says how a vessel comes to stand here when there is none', async () => {
    owner([], { rows: [] });
    renderApp('/my-vessel');
    expect(await screen.findByText('No vessel yet')).toBeTruthy();
  });

  it('shows the next visit with its cost, and takes a question and an acceptance', async () => {
    const { requests } = owner([inDate], { schedule: sampleSchedule({ state: 'proposed' }) });
    const { user } = renderApp('/my-vessel');
    const visit = await screen.findByRole('region', { name: 'The next visit to the yard' });
    expect(visit.textContent).toContain('the mast is lifted out, ashore');
    expect(visit.textContent).toContain('About EUR\u00a02717, an estimate by Skerry Rigging');
    await user.type(within(visit).getByLabelText('Or ask Skerry Rigging first'), 'Can the mast stay up?');
    await user.click(within(visit).getByRole('button', { name: 'Ask' }));
    expect(await within(visit).findByText('You asked: Can the mast stay up?')).toBeTruthy();
    await user.click(within(visit).getByRole('button', { name: 'Accept this plan' }));
    expect(await within(visit).findByText('You have accepted this plan.')).toBeTruthy();
    expect(requests.filter(({ method }) => method === 'POST').map(({ body }) => body)).toEqual([
      { version: 4, answer: 'ask', question: 'Can the mast stay up?' },
      { version: 5, answer: 'accept' },
    ]);
  });

  it('keeps a draft to the yard', async () => {
    owner([inDate], { schedule: sampleSchedule({ plan: null, draftHidden: true }) });
    renderApp('/my-vessel');
    const visit = await screen.findByRole('region', { name: 'The next visit to the yard' });
    expect(visit.textContent).toContain('Skerry Rigging is drawing up a plan');
  });
});
