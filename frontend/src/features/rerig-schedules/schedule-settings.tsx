import {
  scheduleSettingsSchema,
  type RerigScheduleDto,
  type ScheduleSettingsInput,
} from '@stayledger/shared/contracts/rerig-schedules';
import { useState, type FormEvent } from 'react';
import { Attention } from '../../components/feedback/attention';
import { PlainInput } from '../../components/forms/plain-fields';
import { PlainButton } from '../../components/plain-button/plain-button';
import { check } from '../../lib/contract';
import styles from './rerig-schedule.module.css';

interface ScheduleSettingsProps {
  schedule: RerigScheduleDto;
  busy: boolean;
  onSave: (input: ScheduleSettingsInput) => void;
}

/** How far to plan, and when the vessel cannot come. */
export function ScheduleSettings({ schedule, busy, onSave }: ScheduleSettingsProps) {
  const [years, setYears] = useState(String(schedule.horizonYears));
  const [absences, setAbsences] = useState(schedule.absences);
  const [problem, setProblem] = useState<string | null>(null);

  const change = (at: number, part: Partial<(typeof absences)[number]>) =>
    setAbsences(absences.map((absence, index) => (index === at ? { ...absence, ...part } : absence)));

  function onSubmit(event: FormEvent): void {
    event.preventDefault();
    const checked = check(scheduleSettingsSchema, {
      version: schedule.version ?? undefined,
      horizonYears: Number(years),
      absences,
    });
    if (!checked.ok) {
      const [issue] = checked.issues;
      const where = issue.path[0] === 'absences' ? `Absence ${Number(issue.path[1]) + 1}: ` : 'Years: ';
      setProblem(where + issue.message);
      return;
    }
    setProblem(null);
    onSave(checked.value);
  }
  return (
    <details className={styles.fold}>
      <summary>Years planned, and when the vessel cannot come</summary>
      <form onSubmit={onSubmit} className={styles.form} noValidate>
        <div className={styles.pair}>
          <PlainInput
            label="Years planned ahead"
            inputMode="numeric"
            value={years}
            onChange={(event) => setYears(event.target.value)}
          />
        </div>
        {absences.map((absence, at) => (
          <fieldset key={at}>
            <legend>Absence {at + 1}</legend>
            <div className={styles.pair}>
              <PlainInput
                label="From"
                type="date"
                value={absence.fromOn}
                onChange={(event) => change(at, { fromOn: event.target.value })}
              />
              <PlainInput
                label="Until"
                type="date"
                value={absence.untilOn}
                onChange={(event) => change(at, { untilOn: event.target.value })}
              />
              <PlainInput
                label="Why"
                value={absence.reason}
                maxLength={120}
                onChange={(event) => change(at, { reason: event.target.value })}
              />
            </div>
            <div className={styles.steps}>
              <PlainButton onClick={() => setAbsences(absences.filter((_, index) => index !== at))}>
                Remove absence {at + 1}
              </PlainButton>
            </div>
          </fieldset>
        ))}
        {problem ? <Attention role="alert">{problem}</Attention> : null}
        <div className={styles.steps}>
          <PlainButton
            onClick={() => setAbsences([...absences, { fromOn: '', untilOn: '', reason: 'charter' }])}
          >
            Add an absence
          </PlainButton>
          <PlainButton type="submit" weight="primary" disabled={busy}>
            Save and plan anew
          </PlainButton>
        </div>
      </form>
    </details>
  );
}
