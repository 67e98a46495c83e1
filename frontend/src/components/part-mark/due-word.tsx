import type { PartStandingDto } from '@stayledger/shared/contracts/rig';
import type { ReactNode } from 'react';
import styles from './due-word.module.css';

/** A word in rust with its flag where something is due or overdue; plain words otherwise. */
export function DueWord({ due, children }: { due: PartStandingDto['due']; children: ReactNode }) {
  if (due !== 'due' && due !== 'overdue') return <>{children}</>;
  return (
    <span className={styles.due}>
      <svg width="10" height="13" viewBox="0 0 10 13" aria-hidden="true" className={styles.flag}>
        <path d="M1 0.5L9.5 4L1 7.5Z" />
        <path d="M1 0.5V12.5" />
      </svg>
      {children}
    </span>
  );
}
