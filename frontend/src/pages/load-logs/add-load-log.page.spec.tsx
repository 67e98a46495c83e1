import { sessionSchema } from '@stayledger/shared/contracts/auth';
import {
  createLoadLogSchema,
  loadLogSchema,
  rememberedMappingsSchema,
  type LogMapping,
} from '@stayledger/shared/contracts/load-logs';
import { rigSchema } from '@stayledger/shared/contracts/rig';
import { vesselSchema } from '@stayledger/shared/contracts/vessels';
import { screen } from '@testing-library/react';
import { describe, expect, it, vi } from 'vitest';
import { uploadManager } from '../../features/load-logs/upload-manager';
import { fakeApi, reply } from '../../testing/fake-api';
import { sampleLog } from '../../testing/load-log-samples';
import { renderApp } from '../../testing/render-app';
import { sampleId, samplePosition, sampleSession, sampleVessel } from '../../testing/samples';

const starboard = samplePosition({
  id: sampleId(21),
  side: 'starboard',
  label: 'Cap shroud, starboard',
  part: null,
});

function openPage(remembered: LogMapping['channels'] = []) {
  // The bytes themselves go over a protocol of their own, which the browser journeys cover.
  const start = vi.spyOn(uploadManager, 'start').mockImplementation(() => undefined);
  const api = fakeApi(
    {
      'GET /auth/session': reply(sessionSchema, sampleSession('surveyor')),
      'GET /vessels/:id': reply(vesselSchema, sampleVessel()),
      'GET /vessels/:id/rig': reply(rigSchema, { items: [samplePosition(), starboard] }),
      'GET /vessels/:id/channel-mappings': reply(rememberedMappingsSchema, { items: remembered }),
      'POST /vessels/:id/load-logs': reply(
        loadLogSchema,
        sampleLog({ state: 'receiving', receivedBytes: 0 }),
      ),
      'GET /load-logs/:id': reply(loadLogSchema, sampleLog({ state: 'receiving', receivedBytes: 0 })),
    },
    { 'POST /vessels/:id/load-logs': createLoadLogSchema },
  );
  const view = renderApp(`/vessels/${sampleId(10)}/load-logs/new`);
  const posted = () => api.requests.filter(({ method }) => method === 'POST');
  return { ...view, start, posted };
}

const LOG = [
  'time;cap_p [kN];cap_s [t];AWS',
  '2026-06-14T08:00:00;1,5;0,2;14',
  '2026-06-14T08:00:01;2,5;0,3;15',
  '2026-06-14T08:00:02;1,75;0,25;15',
].join('\n');
const logFile = (text = LOG) => new File([text], 'june.csv', { type: 'text/csv' });
const chooser = () => screen.findByLabelText('Drop a load log here, or choose it');

describe('add load log', () => {
  it('shows what it recognised, asks for a doubtful unit, and starts the upload', async () => {
    const { user, start, posted } = openPage();
    await user.upload(await chooser(), logFile());

    expect(await screen.findByText(/parted by semicolons, decimals written with a comma/)).toBeTruthy();
    expect(screen.getByRole('columnheader', { name: 'cap_p [kN]' })).toBeTruthy();
    await user.selectOptions(screen.getByLabelText('Position of column cap_p [kN]'), 'Cap shroud, port');
    await user.selectOptions(screen.getByLabelText('Position of column cap_s [t]'), sampleId(21));
    expect(screen.getByText(/The unit of "cap_s \[t\]" is not certain/)).toBeTruthy();

    await user.click(screen.getByRole('button', { name: 'Start upload' }));
    expect(posted()).toHaveLength(0);
    expect(screen.getByRole('alert').textContent).toContain(
      'Say which unit the loads in column “cap_s [t]” are in.',
    );

    await user.selectOptions(screen.getByLabelText('Unit of column cap_s [t]'), 'tf');
    await user.click(screen.getByRole('button', { name: 'Start upload' }));
    expect(await screen.findByRole('heading', { level: 1, name: 'june-passage.csv' })).toBeTruthy();
    expect(posted()).toHaveLength(1);
    expect(posted()[0].body).toEqual({
      fileName: 'june.csv',
      sizeBytes: logFile().size,
      mapping: {
        delimiter: ';',
        decimalComma: true,
        time: { column: 'time', format: 'iso', naiveOffsetMinutes: 0 },
        channels: [
          { column: 'cap_p [kN]', unit: 'kN', positionId: sampleId(20) },
          { column: 'cap_s [t]', unit: 'tf', positionId: sampleId(21) },
        ],
      },
    });
    expect(start).toHaveBeenCalledOnce();
  });

  it('offers what the columns were matched to before', async () => {
    const { user, posted } = openPage([
      { column: 'cap_p [kN]', unit: 'kN', positionId: sampleId(20) },
      { column: 'cap_s [t]', unit: 'tf', positionId: sampleId(21) },
    ]);
    await user.upload(await chooser(), logFile());
    expect(await screen.findAllByText('As in an earlier log. Check it.')).toHaveLength(2);
    await user.click(screen.getByRole('button', { name: 'Start upload' }));
    expect(await screen.findByRole('heading', { level: 1, name: 'june-passage.csv' })).toBeTruthy();
    expect(posted()[0].body).toMatchObject({ mapping: { channels: [{ unit: 'kN' }, { unit: 'tf' }] } });
  });

  it('says when the first rows are above the breaking load', async () => {
    const { user } = openPage();
    await user.upload(
      await chooser(),
      logFile('time,cap_p\n2026-06-14T08:00:00Z,150\n2026-06-14T08:00:01Z,160\n'),
    );
    await user.selectOptions(await screen.findByLabelText('Position of column cap_p'), 'Cap shroud, port');
    await user.selectOptions(screen.getByLabelText('Unit of column cap_p'), 'kN');
    expect(screen.getByText(/First rows reach 160/).textContent).toContain('Is the unit right?');
    await user.selectOptions(screen.getByLabelText('Unit of column cap_p'), 'kgf');
    expect(screen.getByText(/First rows reach/).textContent).not.toContain('Is the unit right?');
  });

  it.each([
    ['an empty file', '', 'The file is empty'],
    ['a file without figures', 'hello\nworld\n', 'There is no row of figures'],
    ['a file that is no text', 'PK\u0003\u0004\u0000\u0000', 'not a text table'],
  ])('says what is wrong with %s and sends nothing', async (_, text, message) => {
    const { user, posted } = openPage();
    await user.upload(await chooser(), logFile(text));
    expect((await screen.findByRole('alert')).textContent).toContain(message);
    expect(posted()).toHaveLength(0);
  });
});
