import { describe, expect, it } from 'vitest';
import { draftMapping, draftOfMapping, draftProblems, mappingOf, type RecognisedLog } from './mapping-draft';

const CAP_PORT = '018f3a70-0000-7000-8000-000000000001';
const CAP_STARBOARD = '018f3a70-0000-7000-8000-000000000002';
const GONE = '018f3a70-0000-7000-8000-000000000003';
const ON_RIG = [CAP_PORT, CAP_STARBOARD];
const label = (id: string): string => (id === CAP_PORT ? 'Cap shroud, port' : 'Cap shroud, starboard');

const recognised: RecognisedLog = {
  delimiter: ';',
  decimalComma: true,
  columns: [
    { name: 'time', unit: 'unknown', kind: 'time' },
    { name: 'cap_p [kN]', unit: 'kN', kind: 'load' },
    { name: 'cap_s [t]', unit: 'unknown', kind: 'load' },
    { name: 'aws', unit: 'unknown', kind: 'wind-speed' },
  ],
  time: { column: 'time', format: 'iso', hasOffset: false },
  sampleRateHz: 10,
};

describe('draftMapping', () => {
  it('offers positions remembered by column name and leaves the rest open', () => {
    const draft = draftMapping(
      recognised,
      [
        { column: 'cap_p [kN]', unit: 'lbf', positionId: CAP_PORT },
        { column: 'cap_s [t]', unit: 'tf', positionId: CAP_STARBOARD },
      ],
      ON_RIG,
    );
    // The file says kN for the first column, so a remembered lbf does not win; "t" says nothing, so tf is remembered.
    expect(draft.channels).toEqual([
      { column: 'cap_p [kN]', positionId: CAP_PORT, unit: 'kN', origin: 'remembered', isLikely: true },
      { column: 'cap_s [t]', positionId: CAP_STARBOARD, unit: 'tf', origin: 'remembered', isLikely: true },
      { column: 'aws', positionId: '', unit: '', origin: 'none', isLikely: false },
    ]);
    expect(draft).toMatchObject({ delimiter: ';', decimalComma: true });
  });

  it('does not offer a position that is no longer there, nor the same one twice', () => {
    const draft = draftMapping(
      recognised,
      [
        { column: 'cap_p [kN]', unit: 'kN', positionId: GONE },
        { column: 'cap_s [t]', unit: 'tf', positionId: CAP_PORT },
        { column: 'aws', unit: 'kN', positionId: CAP_PORT },
      ],
      ON_RIG,
    );
    expect(draft.channels.map((channel) => channel.positionId)).toEqual(['', CAP_PORT, '']);
  });
});

describe('draftProblems', () => {
  it('asks for a unit that the file leaves in doubt', () => {
    const draft = draftMapping(recognised, [], ON_RIG);
    draft.channels[1].positionId = CAP_STARBOARD;
    expect(draftProblems(draft, label).map((problem) => problem.message)).toEqual([
      'Say which unit the loads in column “cap_s [t]” are in.',
    ]);
  });

  it('wants at least one match', () => {
    expect(draftProblems(draftMapping(recognised, [], ON_RIG), label)).toEqual([
      { field: 'channels', message: 'Match at least one column to a position of the rig.' },
    ]);
  });

  it('does not let two columns feed one position', () => {
    const draft = draftMapping(recognised, [], ON_RIG);
    draft.channels[0].positionId = CAP_PORT;
    draft.channels[1] = { ...draft.channels[1], positionId: CAP_PORT, unit: 'tf' };
    const problems = draftProblems(draft, label);
    expect(problems).toHaveLength(1);
    expect(problems[0].message).toContain('both matched to Cap shroud, port');
  });

  it('wants rate and start where there is no time column', () => {
    const draft = draftMapping({ ...recognised, time: null, sampleRateHz: null }, [], ON_RIG);
    draft.channels[0].positionId = CAP_PORT;
    expect(draftProblems(draft, label).map((problem) => problem.field)).toEqual(['rate', 'start']);
  });
});

describe('mappingOf', () => {
  it('sends only matched columns, with the offset the person said', () => {
    const draft = draftMapping(recognised, [], ON_RIG);
    draft.channels[0].positionId = CAP_PORT;
    if (draft.time.kind === 'column') draft.time.naiveOffsetMinutes = 120;
    expect(mappingOf(draft)).toEqual({
      delimiter: ';',
      decimalComma: true,
      time: { column: 'time', format: 'iso', naiveOffsetMinutes: 120 },
      channels: [{ column: 'cap_p [kN]', unit: 'kN', positionId: CAP_PORT }],
    });
  });

  it('gives back the mapping a draft was made of', () => {
    const mapping = mappingOf({
      delimiter: ',',
      decimalComma: false,
      time: { kind: 'rate', rateHz: 20, startAt: '2026-06-01T10:00:00.000Z' },
      channels: [{ column: 'a', positionId: CAP_PORT, unit: 'N', origin: 'none', isLikely: true }],
    });
    const draft = draftOfMapping(mapping, ['a', 'b']);
    expect(draft.channels.map((channel) => channel.column)).toEqual(['a', 'b']);
    expect(mappingOf(draft)).toEqual(mapping);
  });
});
