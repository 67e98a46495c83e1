import type { PartLifeDto } from '@stayledger/shared/contracts/life';
import { DueWord } from '../../components/part-mark/due-word';
import { standingWord } from '../../components/part-mark/standing-words';
import { useFormat } from '../../lib/formatting/use-format';
import styles from './standing-summary.module.css';

const BASIS_WORDS: Record<PartLifeDto['standing']['loadBasis'], string> = {
  measured: 'from loads measured on this part',
  mirrored: 'from loads measured on the other side',
  'in-line': 'from loads measured in line with it',
  none: 'no load basis',
};

/** The three figures of a part, each with what stands behind it. */
export function StandingSummary({ life, zone }: { life: PartLifeDto; zone: string }) {
  const format = useFormat();
  const { standing } = life;
  const { allowanceUsed, remainingYears, replaceByOn, governingRule } = standing;
  return (
    <dl className={styles.summary}>
      <div>
        <dt>Allowance used</dt>
        <dd>{allowanceUsed === null ? 'not assessed' : format.allowance(allowanceUsed)}</dd>
        <dd>
          {allowanceUsed === null
            ? (standing.notAssessedReason ?? BASIS_WORDS[standing.loadBasis])
            : `${standing.governingDetail ?? 'worst detail'}, ${format.hours(standing.loggedHours)} logged, ${BASIS_WORDS[standing.loadBasis]}`}
        </dd>
      </div>
      <div>
        <dt>Remaining life</dt>
        <dd>{remainingYears === null ? 'no figure' : remainingLife(remainingYears, format)}</dd>
        <dd>
          {remainingYears === null
            ? life.wouldGiveDate.length > 0
              ? 'The list below says what would give one.'
              : ''
            : 'At the planned sailing, on the rule’s curve. Its spread is not computed yet.'}
        </dd>
      </div>
      <div>
        <dt>Replace by</dt>
        <dd>
          {replaceByOn === null ? (
            'no date'
          ) : (
            <DueWord due={standing.due}>
              {format.dueDay(replaceByOn, life.asOfOn, zone)}
              {standing.due === 'due' || standing.due === 'overdue'
                ? ` (${standingWord(standing).toLowerCase()})`
                : ''}
            </DueWord>
          )}
        </dd>
        <dd>
          {governingRule === null
            ? 'No rule gives a date yet.'
            : `${governingRule === 'fatigue' ? 'Fatigue allowance' : 'Calendar rule of the material'} governs.`}
        </dd>
        {standing.fatigueReplaceByOn !== null && standing.calendarReplaceByOn !== null && (
          <dd>
            {governingRule === 'fatigue'
              ? `Calendar rule: ${format.dueDay(standing.calendarReplaceByOn, life.asOfOn, zone)}`
              : `Fatigue allowance: ${format.dueDay(standing.fatigueReplaceByOn, life.asOfOn, zone)}`}
          </dd>
        )}
      </div>
    </dl>
  );
}

/** Years where there are some, months below two years; never finer than the estimate is. */
function remainingLife(years: number, format: ReturnType<typeof useFormat>): string {
  if (years <= 0) return 'none';
  if (years < 2) {
    const months = Math.max(1, Math.round(years * 12));
    return `about ${format.number(months)} ${months === 1 ? 'month' : 'months'}`;
  }
  if (years > 50) return 'over 50 years';
  return `about ${format.number(Math.round(years))} years`;
}
