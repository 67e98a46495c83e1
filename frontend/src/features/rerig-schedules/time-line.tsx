import type { RerigPlanDto } from '@stayledger/shared/contracts/rerig-schedules';
import { dayNumber } from '@stayledger/shared/fatigue/life/days';
import styles from './rerig-schedule.module.css';
import { VISIT_KIND_WORDS, windowLabel } from './schedule-words';

const AXIS_Y = 34;
const MARGIN_PERCENT = 4;

/** Visits along the years planned: a ring where the mast stays up, a filled mark where it comes out. The list is its twin. */
export function TimeLine({ plan: shown }: { plan: RerigPlanDto }) {
  const { plan } = shown;
  const [first, last] = [dayNumber(plan.asOfOn), dayNumber(plan.horizonEndOn)];
  const at = (day: string) =>
    `${MARGIN_PERCENT + ((100 - 2 * MARGIN_PERCENT) * (dayNumber(day) - first)) / (last - first)}%`;
  const [firstYear, lastYear] = [Number(plan.asOfOn.slice(0, 4)) + 1, Number(plan.horizonEndOn.slice(0, 4))];
  const every = lastYear - firstYear > 6 ? 2 : 1;
  const years = Array.from({ length: lastYear - firstYear + 1 }, (_, index) => firstYear + index);
  const words = plan.visits.map(
    ({ windowId, kind, locked }) =>
      `${windowLabel(shown, windowId)} ${VISIT_KIND_WORDS[kind]}${locked ? ' (locked)' : ''}`,
  );
  return (
    <svg
      className={styles.timeLine}
      role="img"
      aria-label={`Visits along the years: ${words.join('; ') || 'none'}`}
    >
      <line
        x1={`${MARGIN_PERCENT}%`}
        x2={`${100 - MARGIN_PERCENT}%`}
        y1={AXIS_Y}
        y2={AXIS_Y}
        className={styles.axis}
      />
      {years.map((year, index) => (
        <g key={year}>
          <line
            x1={at(`${year}-01-01`)}
            x2={at(`${year}-01-01`)}
            y1={AXIS_Y - 4}
            y2={AXIS_Y + 4}
            className={styles.axis}
          />
          {index % every === 0 ? (
            <text x={at(`${year}-01-01`)} y={AXIS_Y + 24} textAnchor="middle" className={styles.year}>
              {year}
            </text>
          ) : null}
        </g>
      ))}
      {plan.visits.map(({ windowId, kind, startOn, locked }) => (
        <g key={windowId}>
          {locked ? <circle cx={at(startOn)} cy={AXIS_Y} r={13} className={styles.lockRing} /> : null}
          <circle
            cx={at(startOn)}
            cy={AXIS_Y}
            r={8}
            className={kind === 'aloft' ? styles.ring : styles.filled}
          />
        </g>
      ))}
    </svg>
  );
}
