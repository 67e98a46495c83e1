import {
  loadLogSchema,
  logReviewSchema,
  postLoadLogSchema,
  recountLoadLogSchema,
  reverseLoadLogSchema,
  setAsideLoadLogSchema,
  type LoadLogDto,
  type LogReviewDto,
} from '@stayledger/shared/contracts/load-logs';
import { sessionSchema } from '@stayledger/shared/contracts/auth';
import { rigSchema } from '@stayledger/shared/contracts/rig';
import { vesselSchema } from '@stayledger/shared/contracts/vessels';
import { ROLE_PERMISSIONS, type Role } from '@stayledger/shared/permissions/permissions';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { fakeApi, refusal, reply } from '../../testing/fake-api';
import { sampleLog, sampleReview } from '../../testing/load-log-samples';
import { renderApp } from '../../testing/render-app';
import { samplePosition, sampleSession, sampleVessel } from '../../testing/samples';

function openLog(
  given: LoadLogDto,
  options: { review?: Partial<LogReviewDto>; role?: Role; postRefusal?: string } = {},
) {
  const role = options.role ?? 'surveyor';
  let log = given;
  const api = fakeApi(
    {
      'GET /auth/session': reply(sessionSchema, sampleSession(role)),
      'GET /load-logs/:id': () => reply(loadLogSchema, log),
      'GET /load-logs/:id/review': () => reply(logReviewSchema, sampleReview(log, options.review)),
      'GET /vessels/:id': reply(vesselSchema, sampleVessel({ permissions: [...ROLE_PERMISSIONS[role]] })),
      'GET /vessels/:id/rig': reply(rigSchema, { items: [samplePosition()] }),
      'POST /load-logs/:id/post': () => {
        if (options.postRefusal !== undefined) return refusal(409, 'state-conflict', options.postRefusal);
        log = {
          ...log,
          state: 'posted',
          decidedByName: 'Ailsa Renwick',
          decidedAt: '2026-06-16T09:30:00.000Z',
        };
        return reply(loadLogSchema, log);
      },
      'POST /load-logs/:id/set-aside': () => {
        log = {
          ...log,
          state: 'set-aside',
          decidedByName: 'Ailsa Renwick',
          decidedAt: '2026-06-16T09:30:00.000Z',
        };
        return reply(loadLogSchema, log);
      },
      'POST /load-logs/:id/reverse': () => {
        log = {
          ...log,
          state: 'counted',
          decidedByName: 'Ailsa Renwick',
          decidedAt: '2026-06-17T09:30:00.000Z',
          decisionReason: 'The cell had slipped',
          version: log.version + 1,
        };
        return reply(loadLogSchema, log);
      },
      'POST /load-logs/:id/recount': () => {
        log = { ...log, state: 'counting', failure: null, version: log.version + 1 };
        return reply(loadLogSchema, log);
      },
    },
    {
      'POST /load-logs/:id/post': postLoadLogSchema,
      'POST /load-logs/:id/set-aside': setAsideLoadLogSchema,
      'POST /load-logs/:id/reverse': reverseLoadLogSchema,
      'POST /load-logs/:id/recount': recountLoadLogSchema,
    },
  );
  const view = renderApp(`/load-logs/${given.id}`);
  const sent = (path: string) =>
    api.requests.filter((request) => request.method === 'POST' && request.path.endsWith(path));
  return { ...view, sent };
}

describe('load log page', () => {
  it('shows what posting would change and posts on one click', async () => {
    const { user, sent } = openLog(sampleLog());
    const accounts = await screen.findByRole('table', { name: 'Allowance used before and after this log' });
    expect(within(accounts).getByText('12 %', { normalizer: plainSpaces })).toBeTruthy();
    expect(within(accounts).getByText('15 %', { normalizer: plainSpaces })).toBeTruthy();

    await user.click(screen.getByRole('button', { name: 'Post to ledger' }));
    expect(await screen.findByText(/Posted by Ailsa Renwick/)).toBeTruthy();
    expect(sent('/post')).toHaveLength(1);
    expect(sent('/post')[0].body).toEqual({ version: 3 });
    expect(sent('/post')[0].headers.get('Idempotency-Key')).toMatch(/^[0-9a-f-]{36}$/);
    expect(screen.queryByRole('button', { name: 'Post to ledger' })).toBeNull();
  });

  it('opens the details of a part', async () => {
    const { user } = openLog(sampleLog());
    await user.click(await screen.findByRole('button', { name: /Show 1 detail/ }));
    expect(screen.getByRole('rowheader', { name: /Upper terminal/ })).toBeTruthy();
  });

  it('says why a log cannot be posted', async () => {
    openLog(sampleLog(), { review: { postDisabledReason: 'No part takes loads from this log.' } });
    const button = await screen.findByRole('button', { name: 'Post to ledger' });
    expect(button.hasAttribute('disabled')).toBe(true);
    expect(screen.getByText('No part takes loads from this log.')).toBeTruthy();
  });

  it('shows the refusal when somebody else was faster', async () => {
    const { user } = openLog(sampleLog(), { postRefusal: 'This log was set aside a moment ago.' });
    await user.click(await screen.findByRole('button', { name: 'Post to ledger' }));
    expect((await screen.findByRole('alert')).textContent).toContain('set aside a moment ago');
  });

  it('wants a reason before it sets a log aside', async () => {
    const { user, sent } = openLog(sampleLog());
    await user.click(await screen.findByRole('button', { name: 'Set aside…' }));
    await user.click(screen.getByRole('button', { name: 'Set aside' }));
    expect(sent('/set-aside')).toHaveLength(0);
    expect(document.activeElement).toBe(screen.getByLabelText('Why is this log set aside?'));
    await user.type(screen.getByLabelText('Why is this log set aside?'), 'Sensor was loose');
    await user.click(screen.getByRole('button', { name: 'Set aside' }));
    expect(await screen.findByText(/Set aside by Ailsa Renwick/)).toBeTruthy();
    expect(sent('/set-aside')[0].body).toEqual({ version: 3, reason: 'Sensor was loose' });
  });

  it('takes a posted log back with a reason, and says so afterwards', async () => {
    const posted: Partial<LoadLogDto> = {
      state: 'posted',
      decidedByName: 'Ailsa Renwick',
      decidedAt: '2026-06-16T09:30:00.000Z',
    };
    const { user, sent } = openLog(sampleLog(posted));
    await user.click(await screen.findByRole('button', { name: 'Take back from the ledger…' }));
    expect(screen.getByText(/Every entry this log made is reversed/)).toBeTruthy();
    await user.click(screen.getByRole('button', { name: 'Take it back' }));
    expect(sent('/reverse')).toHaveLength(0);
    expect(document.activeElement).toBe(screen.getByLabelText('Why is this log taken back?'));
    await user.type(screen.getByLabelText('Why is this log taken back?'), 'The cell had slipped');
    await user.click(screen.getByRole('button', { name: 'Take it back' }));
    expect((await screen.findByText(/posted and taken back by Ailsa Renwick/)).textContent).toContain(
      'The cell had slipped',
    );
    expect(sent('/reverse')[0].body).toEqual({ version: 3, reason: 'The cell had slipped' });
    expect(screen.getByRole('button', { name: 'Post to ledger' })).toBeTruthy();
  });

  it('lets nobody else take a log back', async () => {
    openLog(sampleLog({ state: 'posted', decidedAt: '2026-06-16T09:30:00.000Z' }), { role: 'owner' });
    await screen.findByRole('table', { name: 'Allowance used before and after this log' });
    expect(screen.queryByRole('button', { name: /Take back/ })).toBeNull();
  });

  it('leaves the decision to those who look after the vessel', async () => {
    openLog(sampleLog(), { role: 'owner' });
    expect(await screen.findByText(/A surveyor or rigger who looks after this vessel/)).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Post to ledger' })).toBeNull();
  });

  it('puts the weightiest finding first, with its place and what was done', async () => {
    const finding = { column: 'cap_port', fromAt: null, toAt: null, count: 1 };
    openLog(
      sampleLog({
        findings: [
          {
            ...finding,
            code: 'missing-cell',
            severity: 'info',
            line: 7,
            message: 'A cell is empty.',
            action: 'Passed over.',
          },
          {
            ...finding,
            code: 'implausible-load',
            severity: 'serious',
            line: 99,
            message: 'The load is above the breaking load.',
            action: 'Counted as it stands. Check the unit.',
          },
        ],
      }),
    );
    const findings = within(await screen.findByRole('region', { name: 'Findings' })).getAllByRole('listitem');
    expect(findings[0].textContent).toContain('Serious: The load is above the breaking load.');
    expect(findings[0].textContent).toContain('line 99');
    expect(findings[0].textContent).toContain('Check the unit');
    expect(findings[1].textContent).toContain('Note: A cell is empty.');
  });

  it('reads a trace out by keyboard', async () => {
    const { user } = openLog(sampleLog());
    const slider = await screen.findByRole('slider', { name: 'Time on the trace of Cap shroud, port' });
    slider.focus();
    await user.keyboard('{Home}{ArrowRight}');
    // 09:00 UTC is 11:00 in Oslo in June.
    expect(plainSpaces(slider.getAttribute('aria-valuetext') ?? '')).toBe(
      '14 Jun 2026, 11:00: 3.00 kN to 21.5 kN.',
    );
  });

  it('says where the same file is already', async () => {
    openLog(sampleLog({ sameFileAs: { id: sampleLog().id, state: 'posted', fileName: 'june-again.csv' } }));
    expect(await screen.findByText(/The same file is here already/)).toBeTruthy();
    expect(screen.getByRole('link', { name: 'june-again.csv' })).toBeTruthy();
  });

  it('says what was wrong with a file and counts it again with a corrected mapping', async () => {
    const { user, sent } = openLog(
      sampleLog({
        state: 'failed',
        failure: {
          code: 'no-such-column',
          message: 'Line 1 has no column “cap_port”. Its columns are time, cap_p.',
        },
      }),
    );
    expect(await screen.findByText(/Line 1 has no column/)).toBeTruthy();
    await user.selectOptions(await screen.findByLabelText('Unit of column cap_port'), 'lbf');
    await user.click(screen.getByRole('button', { name: 'Count again' }));
    expect(await screen.findByRole('progressbar', { name: /count/i })).toBeTruthy();
    expect(sent('/recount')[0].body).toMatchObject({
      version: 3,
      mapping: { channels: [{ column: 'cap_port', unit: 'lbf' }] },
    });
  });

  it('shows how far the counting is and that one may leave', async () => {
    openLog(
      sampleLog({
        state: 'counting',
        job: {
          id: sampleLog().id,
          kind: 'count-load-log',
          subjectId: sampleLog().id,
          state: 'running',
          progress: 0.42,
          attempts: 1,
          error: null,
          createdAt: '2026-06-15T07:00:00.000Z',
          startedAt: '2026-06-15T07:00:01.000Z',
          finishedAt: null,
        },
      }),
    );
    const bar = await screen.findByRole('progressbar', { name: 'Counting cycles' });
    expect(bar.getAttribute('aria-valuenow')).toBe('42');
    expect(screen.getByText(/You may leave this page/)).toBeTruthy();
  });

  it('asks for the same file to go on with an upload that was cut', async () => {
    const { user } = openLog(sampleLog({ state: 'receiving', receivedBytes: 250_000, rows: null }));
    const input = await screen.findByLabelText('Choose june-passage.csv to go on');
    expect(screen.getByRole('progressbar').getAttribute('aria-valuenow')).toBe('25');
    await user.upload(input, new File(['time,a\n'], 'other.csv', { type: 'text/csv' }));
    expect((await screen.findByRole('alert')).textContent).toContain('That is another file.');
  });
});

/** No-break spaces as plain ones, for comparisons. */
function plainSpaces(text: string): string {
  return text.replaceAll(/[\u00a0\u202f]/g, ' ').trim();
}
