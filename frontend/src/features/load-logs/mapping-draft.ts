import {
  logMappingSchema,
  type LOAD_UNITS,
  type LogMapping,
  type rememberedMappingsSchema,
} from '@stayledger/shared/contracts/load-logs';
import type { z } from 'zod';

export type LoadUnit = (typeof LOAD_UNITS)[number];
export const TIME_FORMATS = ['iso', 'epoch-s', 'epoch-ms'] as const;
export type TimeFormat = (typeof TIME_FORMATS)[number];
type Remembered = z.infer<typeof rememberedMappingsSchema>['items'];

/** What recognition gives that the draft needs. */
export interface RecognisedLog {
  delimiter: string;
  decimalComma: boolean;
  columns: readonly { name: string; unit: LoadUnit | 'unknown'; kind: string }[];
  time: { column: string; format: TimeFormat; hasOffset: boolean } | null;
  sampleRateHz: number | null;
}

export interface DraftChannel {
  column: string;
  /** Empty: this column is left out. */
  positionId: string;
  /** Empty: not said yet. A unit that cannot be read from the file is never guessed. */
  unit: LoadUnit | '';
  /** Where the choice came from, to be said beside it. */
  origin: 'remembered' | 'recognised' | 'none';
  /** Looks like loads; the others (wind, speed, position) wait behind a button. */
  isLikely: boolean;
}

export interface MappingDraft {
  delimiter: LogMapping['delimiter'];
  decimalComma: boolean;
  time:
    | { kind: 'column'; column: string; format: TimeFormat; hasOffset: boolean; naiveOffsetMinutes: number }
    | { kind: 'rate'; rateHz: number | null; startAt: string | null };
  channels: DraftChannel[];
}

export interface DraftProblem {
  /** Id of the field to go to. */
  field: string;
  message: string;
}

const DELIMITERS: readonly string[] = logMappingSchema.shape.delimiter.unwrap().options;

function isDelimiter(text: string): text is LogMapping['delimiter'] {
  return DELIMITERS.includes(text);
}

/**
 * The first proposal: what the file says, filled up with what columns of the same name were matched to before. A unit
 * in the file wins over a remembered one; a remembered position is offered only while it is still on the rig.
 */
export function draftMapping(
  log: RecognisedLog,
  remembered: Remembered,
  positionIds: readonly string[],
): MappingDraft {
  const known = new Map(
    remembered.filter((item) => positionIds.includes(item.positionId)).map((item) => [item.column, item]),
  );
  const taken = new Set<string>();
  const channels = log.columns
    .filter((column) => column.kind !== 'time')
    .map((column): DraftChannel => {
      const before = known.get(column.name);
      const stillFree = before !== undefined && !taken.has(before.positionId);
      if (stillFree) taken.add(before.positionId);
      return {
        column: column.name,
        positionId: stillFree ? before.positionId : '',
        unit: column.unit !== 'unknown' ? column.unit : (before?.unit ?? ''),
        origin: stillFree ? 'remembered' : column.unit !== 'unknown' ? 'recognised' : 'none',
        isLikely: stillFree || column.kind === 'load',
      };
    });
  return {
    delimiter: isDelimiter(log.delimiter) ? log.delimiter : ',',
    decimalComma: log.decimalComma,
    time:
      log.time === null
        ? { kind: 'rate', rateHz: log.sampleRateHz, startAt: null }
        : { kind: 'column', ...log.time, naiveOffsetMinutes: 0 },
    channels,
  };
}

/** The draft of a log that is to be read again: its own mapping, with the columns it left out. */
export function draftOfMapping(mapping: LogMapping, allColumns: readonly string[]): MappingDraft {
  const matched = new Map(mapping.channels.map((channel) => [channel.column, channel]));
  const columns = [...new Set([...mapping.channels.map((channel) => channel.column), ...allColumns])];
  return {
    delimiter: mapping.delimiter,
    decimalComma: mapping.decimalComma,
    time:
      'column' in mapping.time
        ? {
            kind: 'column',
            column: mapping.time.column,
            format: mapping.time.format,
            hasOffset: false,
            naiveOffsetMinutes: mapping.time.naiveOffsetMinutes,
          }
        : { kind: 'rate', rateHz: mapping.time.rateHz, startAt: mapping.time.startAt },
    channels: columns.map((column) => {
      const channel = matched.get(column);
      return {
        column,
        positionId: channel?.positionId ?? '',
        unit: channel?.unit ?? '',
        origin: 'none',
        isLikely: true,
      };
    }),
  };
}

/** Everything that keeps the draft from being used, in words that say what mends it. Empty: it can be sent. */
export function draftProblems(
  draft: MappingDraft,
  positionLabel: (positionId: string) => string,
): DraftProblem[] {
  const problems: DraftProblem[] = [];
  if (draft.time.kind === 'rate') {
    if (draft.time.rateHz === null || !(draft.time.rateHz > 0)) {
      problems.push({
        field: 'rate',
        message: 'The file has no time column. Say how many rows were recorded each second.',
      });
    }
    if (draft.time.startAt === null) {
      problems.push({ field: 'start', message: 'Say when the first row was recorded.' });
    }
  }
  const matched = draft.channels.filter((channel) => channel.positionId !== '');
  for (const channel of matched) {
    if (draft.time.kind === 'column' && draft.time.column === channel.column) {
      problems.push({
        field: `position-${channel.column}`,
        message: `Column “${channel.column}” tells the time, so it cannot hold loads too.`,
      });
    }
  }
  if (matched.length === 0) {
    problems.push({ field: 'channels', message: 'Match at least one column to a position of the rig.' });
  }
  for (const channel of matched) {
    if (channel.unit === '') {
      problems.push({
        field: `unit-${channel.column}`,
        message: `Say which unit the loads in column “${channel.column}” are in.`,
      });
    }
  }
  const columnsOf = new Map<string, string[]>();
  for (const channel of matched) {
    columnsOf.set(channel.positionId, [...(columnsOf.get(channel.positionId) ?? []), channel.column]);
  }
  for (const [positionId, columns] of columnsOf) {
    if (columns.length > 1) {
      problems.push({
        field: `position-${columns[1]}`,
        message: `Columns ${columns.map((column) => `“${column}”`).join(' and ')} are both matched to ${positionLabel(positionId)}. Its cycles would count twice: leave one out.`,
      });
    }
  }
  return problems;
}

/** The mapping to send. Only for drafts without problems; the contract is the last check. */
export function mappingOf(draft: MappingDraft): LogMapping {
  return logMappingSchema.parse({
    delimiter: draft.delimiter,
    decimalComma: draft.decimalComma,
    time:
      draft.time.kind === 'column'
        ? {
            column: draft.time.column,
            format: draft.time.format,
            naiveOffsetMinutes: draft.time.hasOffset ? 0 : draft.time.naiveOffsetMinutes,
          }
        : { rateHz: draft.time.rateHz, startAt: draft.time.startAt },
    channels: draft.channels
      .filter((channel) => channel.positionId !== '')
      .map(({ column, unit, positionId }) => ({ column, unit, positionId })),
  });
}
