import { LOAD_UNITS } from '@stayledger/shared/contracts/load-logs';
import type { PositionDto } from '@stayledger/shared/contracts/rig';
import { useId, useState } from 'react';
import { PlainButton } from '../../components/plain-button/plain-button';
import { useFormat } from '../../lib/formatting/use-format';
import { largestFirstLoadKn } from './first-loads';
import {
  TIME_FORMATS,
  type DraftChannel,
  type DraftProblem,
  type LoadUnit,
  type MappingDraft,
  type TimeFormat,
} from './mapping-draft';
import styles from './mapping-form.module.css';
import { zoneClock } from './zone-clock';

const UNIT_WORDS: Record<LoadUnit, string> = {
  kN: 'kN (kilonewton)',
  N: 'N (newton)',
  kgf: 'kgf (kilogram-force)',
  daN: 'daN (decanewton)',
  lbf: 'lbf (pound-force)',
  tf: 'tf (tonne-force, 1,000 kgf)',
};

interface MappingFormProps {
  draft: MappingDraft;
  onChange: (draft: MappingDraft) => void;
  positions: readonly PositionDto[];
  zone: string;
  /** First cells per column, where the file itself is at hand. */
  firstValues: ReadonlyMap<string, readonly string[]>;
  /** Doubts of the recognition about single columns ("t" may be tonne or ton), in its words. */
  columnDoubts: ReadonlyMap<string, string>;
  /** Shown only after the person tried to go on. */
  problems: readonly DraftProblem[];
  /** First instant of the log as read from the file, to show what an offset makes of it. */
  firstTime: string | null;
}

/** Which column is which position, in which unit, and how time is told. */
export function MappingForm(props: MappingFormProps) {
  const { draft, onChange } = props;
  const [showsAll, setShowsAll] = useState(false);
  const shown = draft.channels.filter((channel) => showsAll || channel.isLikely || channel.positionId !== '');
  const hidden = draft.channels.length - shown.length;
  return (
    <>
      <TimeFields {...props} />
      <fieldset className={styles.group}>
        <legend>Columns</legend>
        <ProblemLine problems={props.problems} field="channels" />
        <table className={styles.table}>
          <thead>
            <tr>
              <th scope="col">Column of the file</th>
              <th scope="col">First values</th>
              <th scope="col">Load of</th>
              <th scope="col">Unit</th>
            </tr>
          </thead>
          <tbody>
            {shown.map((channel) => (
              <ChannelRow
                key={channel.column}
                {...props}
                channel={channel}
                onChannel={(changed) =>
                  onChange({
                    ...draft,
                    channels: draft.channels.map((other) =>
                      other.column === changed.column ? changed : other,
                    ),
                  })
                }
              />
            ))}
          </tbody>
        </table>
        {hidden > 0 && (
          <p>
            <PlainButton onClick={() => setShowsAll(true)}>
              Show {hidden} more {hidden === 1 ? 'column that does' : 'columns that do'} not look like loads
            </PlainButton>
          </p>
        )}
      </fieldset>
    </>
  );
}

function ChannelRow({
  channel,
  draft,
  positions,
  firstValues,
  columnDoubts,
  problems,
  onChannel,
}: MappingFormProps & { channel: DraftChannel; onChannel: (channel: DraftChannel) => void }) {
  const format = useFormat();
  const values = firstValues.get(channel.column) ?? [];
  const doubt = columnDoubts.get(channel.column);
  const position = positions.find((candidate) => candidate.id === channel.positionId);
  const largestKn =
    channel.unit === '' || channel.positionId === ''
      ? null
      : largestFirstLoadKn(values, channel.unit, draft.decimalComma);
  const breakingLoadKn = position?.part?.breakingLoadKn ?? null;
  return (
    <tr>
      <th scope="row">{channel.column}</th>
      <td className={styles.values}>{values.slice(0, 4).join('  ') || '–'}</td>
      <td>
        <select
          id={fieldId(`position-${channel.column}`)}
          className={styles.control}
          aria-label={`Position of column ${channel.column}`}
          aria-invalid={hasProblem(problems, `position-${channel.column}`)}
          value={channel.positionId}
          onChange={(event) => onChannel({ ...channel, positionId: event.target.value, origin: 'none' })}
        >
          <option value="">Leave out</option>
          {positions.map((candidate) => (
            <option key={candidate.id} value={candidate.id}>
              {candidate.label}
              {candidate.part === null ? ' (no part fitted)' : ''}
            </option>
          ))}
        </select>
        {channel.origin === 'remembered' && <p className={styles.note}>As in an earlier log. Check it.</p>}
        <ProblemLine problems={problems} field={`position-${channel.column}`} />
      </td>
      <td>
        <select
          id={fieldId(`unit-${channel.column}`)}
          className={styles.control}
          aria-label={`Unit of column ${channel.column}`}
          aria-invalid={hasProblem(problems, `unit-${channel.column}`)}
          disabled={channel.positionId === ''}
          value={channel.unit}
          onChange={(event) => {
            const unit = LOAD_UNITS.find((candidate) => candidate === event.target.value) ?? '';
            onChannel({ ...channel, unit });
          }}
        >
          <option value="">Choose the unit</option>
          {LOAD_UNITS.map((unit) => (
            <option key={unit} value={unit}>
              {UNIT_WORDS[unit]}
            </option>
          ))}
        </select>
        <ProblemLine problems={problems} field={`unit-${channel.column}`} />
        {channel.positionId !== '' && doubt !== undefined && <p className={styles.doubt}>{doubt}</p>}
        {largestKn !== null && (
          <p className={breakingLoadKn !== null && largestKn > breakingLoadKn ? styles.doubt : styles.note}>
            First rows reach {format.force(largestKn)}
            {breakingLoadKn === null ? '.' : `; the part breaks at ${format.force(breakingLoadKn)}.`}
            {breakingLoadKn !== null && largestKn > breakingLoadKn ? ' Is the unit right?' : ''}
          </p>
        )}
      </td>
    </tr>
  );
}

const TIME_FORMAT_WORDS: Record<TimeFormat, string> = {
  iso: 'dates and clock times',
  'epoch-s': 'seconds since 1970',
  'epoch-ms': 'milliseconds since 1970',
};

function TimeFields(props: MappingFormProps) {
  const { draft, onChange } = props;
  const columnId = useId();
  const formatId = useId();
  const time = draft.time;
  const columns = [
    ...(time.kind === 'column' ? [time.column] : []),
    ...draft.channels.map(({ column }) => column),
  ];
  return (
    <fieldset className={styles.group}>
      <legend>Time</legend>
      <div className={styles.fields}>
        <div className={styles.field}>
          <label htmlFor={columnId}>Column of times</label>
          <select
            id={columnId}
            className={styles.control}
            value={time.kind === 'column' ? time.column : ''}
            onChange={(event) => onChange({ ...draft, time: timeSource(draft, event.target.value) })}
          >
            <option value="">None: rows are evenly spaced</option>
            {[...new Set(columns)].map((column) => (
              <option key={column} value={column}>
                {column}
              </option>
            ))}
          </select>
        </div>
        {time.kind === 'column' && (
          <div className={styles.field}>
            <label htmlFor={formatId}>Written as</label>
            <select
              id={formatId}
              className={styles.control}
              value={time.format}
              onChange={(event) => {
                const format = TIME_FORMATS.find((candidate) => candidate === event.target.value);
                if (format) onChange({ ...draft, time: { ...time, format } });
              }}
            >
              {TIME_FORMATS.map((format) => (
                <option key={format} value={format}>
                  {TIME_FORMAT_WORDS[format]}
                </option>
              ))}
            </select>
          </div>
        )}
        {time.kind === 'column' && time.format === 'iso' && !time.hasOffset && (
          <OffsetField {...props} time={time} />
        )}
        {time.kind === 'rate' && <RateFields {...props} time={time} />}
      </div>
    </fieldset>
  );
}

/** A column that was taken for loads becomes the clock, or the clock becomes an ordinary column again. */
function timeSource(draft: MappingDraft, column: string): MappingDraft['time'] {
  if (column === '') return { kind: 'rate', rateHz: null, startAt: null };
  return { kind: 'column', column, format: 'iso', hasOffset: false, naiveOffsetMinutes: 0 };
}

function OffsetField({
  draft,
  onChange,
  zone,
  firstTime,
  time,
}: MappingFormProps & { time: Extract<MappingDraft['time'], { kind: 'column' }> }) {
  const id = useId();
  const firstMs = Date.parse(`${(firstTime ?? '').trim().replace(' ', 'T')}Z`);
  const zoneOffset = Number.isNaN(firstMs) ? null : zoneClock(zone).offsetMinutes(firstMs);
  const offsets = [...new Set([0, zoneOffset ?? 0, time.naiveOffsetMinutes])];
  return (
    <div className={styles.field}>
      <label htmlFor={id}>Clock of the logger (the times do not say)</label>
      <select
        id={id}
        className={styles.control}
        value={time.naiveOffsetMinutes}
        onChange={(event) =>
          onChange({ ...draft, time: { ...time, naiveOffsetMinutes: Number(event.target.value) } })
        }
      >
        {offsets.map((minutes) => (
          <option key={minutes} value={minutes}>
            {offsetWords(minutes)}
            {minutes === zoneOffset ? ` (the vessel’s clock, ${zone})` : ''}
          </option>
        ))}
      </select>
    </div>
  );
}

function RateFields({
  draft,
  onChange,
  problems,
  zone,
  time,
}: MappingFormProps & { time: Extract<MappingDraft['time'], { kind: 'rate' }> }) {
  const format = useFormat();
  const rateId = useId();
  const startId = useId();
  const clock = zoneClock(zone);
  const startLocal =
    time.startAt === null ? '' : new Date(clock.toLocal(Date.parse(time.startAt))).toISOString().slice(0, 16);
  return (
    <>
      <div className={styles.field}>
        <label htmlFor={rateId}>Rows per second (Hz)</label>
        <input
          id={rateId}
          className={styles.control}
          inputMode="decimal"
          aria-invalid={hasProblem(problems, 'rate')}
          defaultValue={time.rateHz === null ? '' : format.significant(time.rateHz, 6)}
          onChange={(event) =>
            onChange({ ...draft, time: { ...time, rateHz: format.parseNumber(event.target.value) } })
          }
        />
        <ProblemLine problems={problems} field="rate" />
      </div>
      <div className={styles.field}>
        <label htmlFor={startId}>First row recorded (vessel’s clock, {zone})</label>
        <input
          id={startId}
          className={styles.control}
          type="datetime-local"
          aria-invalid={hasProblem(problems, 'start')}
          defaultValue={startLocal}
          onChange={(event) => {
            const local = Date.parse(`${event.target.value}Z`);
            const startAt = Number.isNaN(local) ? null : new Date(clock.toInstant(local)).toISOString();
            onChange({ ...draft, time: { ...time, startAt } });
          }}
        />
        <ProblemLine problems={problems} field="start" />
      </div>
    </>
  );
}

function ProblemLine({ problems, field }: { problems: readonly DraftProblem[]; field: string }) {
  return problems
    .filter((problem) => problem.field === field)
    .map((problem) => (
      <p key={problem.message} className={styles.doubt}>
        {problem.message}
      </p>
    ));
}

function hasProblem(problems: readonly DraftProblem[], field: string): boolean {
  return problems.some((problem) => problem.field === field);
}

function fieldId(field: string): string {
  return `mapping-${field.replaceAll(/[^\w-]/g, '_')}`;
}

function offsetWords(minutes: number): string {
  if (minutes === 0) return 'UTC';
  const size = Math.abs(minutes);
  const hours = String(Math.floor(size / 60)).padStart(2, '0');
  return `UTC${minutes < 0 ? '−' : '+'}${hours}:${String(size % 60).padStart(2, '0')}`;
}
