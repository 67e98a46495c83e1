import type {
  PlanChangeInput,
  PlannedVisitDto,
  RerigPlanDto,
} from '@stayledger/shared/contracts/rerig-schedules';
import { useState, type FormEvent } from 'react';
import { PlainSelect } from '../../components/forms/plain-fields';
import { PlainButton } from '../../components/plain-button/plain-button';
import styles from './rerig-schedule.module.css';

interface ChangeVisitProps {
  plan: RerigPlanDto;
  visit: PlannedVisitDto;
  label: string;
  busy: boolean;
  onChange: (change: PlanChangeInput) => void;
}

/** What a person may settle about one visit; the rest is planned anew around it, and can be undone. */
export function ChangeVisit({ plan, visit, label, busy, onChange }: ChangeVisitProps) {
  const others = plan.windows.filter(({ id }) => id !== visit.windowId);
  const [toWindowId, setToWindowId] = useState(others[0]?.id ?? '');
  const [chosen, setChosen] = useState<readonly string[]>([]);
  const { windowId } = visit;
  const isSplit = chosen.length > 0 && chosen.length < visit.tasks.length;

  function onSubmit(event: FormEvent): void {
    event.preventDefault();
    onChange(
      isSplit
        ? { change: 'split', fromWindowId: windowId, toWindowId, taskIds: [...chosen] }
        : { change: 'move', fromWindowId: windowId, toWindowId },
    );
  }
  return (
    <details className={styles.fold}>
      <summary>Change the visit of {label}</summary>
      <div className={styles.steps}>
        <PlainButton
          disabled={busy}
          onClick={() => onChange({ change: visit.locked ? 'unlock' : 'lock', windowId })}
        >
          {visit.locked ? 'Unlock' : 'Lock'}
        </PlainButton>
        <PlainButton disabled={busy} onClick={() => onChange({ change: 'drop', windowId })}>
          Drop
        </PlainButton>
      </div>
      {others.length > 0 ? (
        <form onSubmit={onSubmit}>
          <div className={styles.pair}>
            <PlainSelect
              label="Move to"
              value={toWindowId}
              onChange={(event) => setToWindowId(event.target.value)}
            >
              {others.map((window) => (
                <option key={window.id} value={window.id}>
                  {window.label}
                </option>
              ))}
            </PlainSelect>
          </div>
          {visit.tasks.length > 1 ? (
            <fieldset className={styles.fold}>
              <legend>Only this work (none ticked: the whole visit)</legend>
              {visit.tasks.map(({ taskId, name }) => (
                <label key={taskId} className={styles.check}>
                  <input
                    type="checkbox"
                    checked={chosen.includes(taskId)}
                    onChange={(event) =>
                      setChosen(
                        event.target.checked ? [...chosen, taskId] : chosen.filter((id) => id !== taskId),
                      )
                    }
                  />
                  {name}
                </label>
              ))}
            </fieldset>
          ) : null}
          <PlainButton type="submit" disabled={busy}>
            {isSplit ? 'Move this work' : 'Move the visit'}
          </PlainButton>
        </form>
      ) : null}
    </details>
  );
}
