import { auditPageSchema } from '@stayledger/shared/contracts/audit';
import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { firmPageSchema } from '@stayledger/shared/contracts/firms';
import { jobPageSchema } from '@stayledger/shared/contracts/jobs';
import { userPageSchema } from '@stayledger/shared/contracts/users';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, reply, type FakeRequest } from '../../testing/fake-api';
import { renderApp } from '../../testing/render-app';
import { sampleId, sampleSession } from '../../testing/samples';

const at = '2026-03-01T08:00:00.000Z';
const person = (number: number) => ({
  id: sampleId(number),
  name: `Person ${number}`,
  email: `person${number}@example.org`,
  active: number !== 301,
  memberships: [{ role: 'rigger' as const, firmId: sampleId(2), firmName: 'Skerry Rigging' }],
  createdAt: at,
});

function service() {
  return fakeApi({
    'GET /auth/session': reply(sessionSchema, sampleSession('administrator')),
    'GET /users': ({ query }: FakeRequest) =>
      query.get('cursor')
        ? reply(userPageSchema, { items: [person(302)], nextCursor: null })
        : reply(userPageSchema, { items: [person(300), person(301)], nextCursor: 'next' }),
    'GET /firms': reply(firmPageSchema, { items: [], nextCursor: null }),
    'GET /jobs': reply(jobPageSchema, {
      items: [
        {
          id: sampleId(400),
          kind: 'count-load-log',
          subjectId: sampleId(401),
          state: 'failed',
          progress: 0.5,
          attempts: 1,
          error: { code: 'unreadable', message: 'Line 40 holds no time.' },
          createdAt: at,
          startedAt: at,
          finishedAt: at,
        },
      ],
      nextCursor: null,
    }),
    'GET /audit-events': reply(auditPageSchema, { items: [], nextCursor: null }),
  });
}

describe('the administration', () => {
  it('is where an administrator lands, with people and their standing', async () => {
    service();
    const { user } = renderApp('/');
    const table = await screen.findByRole('table', { name: 'Users' });
    expect(within(table).getByRole('row', { name: /Person 301.*closed/ })).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Show more' }));
    expect(await screen.findByText('Person 302')).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Show more' })).toBeNull();
  });

  it('shows why a job failed', async () => {
    service();
    const { user } = renderApp('/administration');
    await user.click(await screen.findByRole('link', { name: 'Background jobs' }));
    expect(await screen.findByText('Line 40 holds no time.')).toBeTruthy();
    expect(screen.getByRole('link', { name: 'Background jobs' }).getAttribute('aria-current')).toBe('page');
  });

  it('says what will stand in an empty part', async () => {
    service();
    renderApp('/administration?view=firms');
    expect(await screen.findByText('The practices and insurers will stand here.')).toBeTruthy();
  });
});
