import type { LogReviewDto } from '@stayledger/shared/contracts/load-logs';
import { Fragment, useState } from 'react';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { useFormat } from '../../lib/formatting/use-format';
import styles from './before-after.module.css';

type ReviewPart = LogReviewDto['parts'][number];

/** Allowance used per fitted part before and after posting, each detail one click away. */
export function BeforeAfter({ parts, isPosted }: { parts: readonly ReviewPart[]; isPosted: boolean }) {
  if (parts.length === 0) {
    return (
      <p>No fitted part takes loads from the columns of this log, so posting it would change no account.</p>
    );
  }
  return (
    <table className={styles.table}>
      <caption className="visually-hidden">Allowance used before and after this log</caption>
      <thead>
        <tr>
          <th scope="col">Part</th>
          <th scope="col" className={styles.figure}>
            Before
          </th>
          <th scope="col" className={styles.figure}>
            {isPosted ? 'With it' : 'After'}
          </th>
        </tr>
      </thead>
      <tbody>
        {parts.map((part) => (
          <PartRows key={part.partId} part={part} />
        ))}
      </tbody>
    </table>
  );
}

function PartRows({ part }: { part: ReviewPart }) {
  const format = useFormat();
  const [isOpen, setIsOpen] = useState(false);
  return (
    <Fragment>
      <tr>
        <th scope="row" className={styles.part}>
          <Link to={paths.part.to(part.partId)}>{part.positionLabel}</Link>
          {part.note !== null && <p className={styles.note}>{part.note}</p>}
          {part.details.length > 0 && (
            <div>
              <button
                type="button"
                className={styles.toggle}
                aria-expanded={isOpen}
                onClick={() => setIsOpen(!isOpen)}
              >
                {isOpen ? 'Hide' : 'Show'} {format.number(part.details.length)}{' '}
                {part.details.length === 1 ? 'detail' : 'details'}
                <span className="visually-hidden"> of {part.positionLabel}</span>
              </button>
            </div>
          )}
        </th>
        <td className={styles.figure}>
          {part.before === null ? 'not assessed' : format.allowance(part.before)}
        </td>
        <td className={styles.figure}>
          {part.after === null ? 'not assessed' : format.allowance(part.after)}
        </td>
      </tr>
      {isOpen &&
        part.details.map((detail) => (
          <tr key={detail.detailId} className={styles.detail}>
            <th scope="row">
              {detail.name}
              <p className={styles.note}>
                recorded {format.allowance(detail.recorded)}, between logs{' '}
                {signed(detail.betweenLogs, format.percent)}
              </p>
            </th>
            <td className={styles.figure}>{format.allowance(detail.before)}</td>
            <td className={styles.figure}>{format.allowance(detail.after)}</td>
          </tr>
        ))}
    </Fragment>
  );
}

/** The between-logs share may shrink: cycles that stood half open close once the missing stretch is there. */
function signed(ratio: number, percent: (value: number) => string): string {
  return ratio < 0 ? `−${percent(-ratio)}` : percent(ratio);
}
