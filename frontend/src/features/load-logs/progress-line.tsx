import { useId } from 'react';
import styles from './progress-line.module.css';

/** Ink that runs along a ruled line. `share` is 0 to 1. */
export function ProgressLine({ label, share, detail }: { label: string; share: number; detail: string }) {
  const labelId = useId();
  const percent = Math.round(Math.min(1, Math.max(0, share)) * 100);
  return (
    <div className={styles.line}>
      <p className={styles.words}>
        <span id={labelId}>{label}</span>
        <span className="figure">
          {percent}&nbsp;%{detail === '' ? '' : `, ${detail}`}
        </span>
      </p>
      <div
        className={styles.track}
        role="progressbar"
        aria-labelledby={labelId}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={percent}
      >
        <div className={styles.fill} style={{ width: `${percent}%` }} />
      </div>
    </div>
  );
}
